import { useQuery } from "@tanstack/react-query";
import { router, useLocalSearchParams } from "expo-router";
import { View } from "react-native";
import type { Certificate, Instrument } from "@shared/contracts/evidence";
import { Answer } from "@features/api";
import { evidencePaths } from "@features/evidence/evidence-paths";
import { useFormat, useWords } from "@features/i18n";
import {
  Banner,
  Button,
  Card,
  Chip,
  DefinitionRows,
  ListRow,
  LoopTag,
  Screen,
  Text,
  type Definition,
} from "@features/ui";
import { CalibrationBar } from "./calibration-bar";
import { certificateToday, daysUntil, lifeScaleOf } from "./calibration-life";
import { CalibrationWords } from "./calibration-words";
import { CertificateSheet } from "./certificate-sheet";
import { kitPaths } from "./kit-paths";
import { kitQueries } from "./kit-queries";
import { placementNow, serviceOf } from "./kit-table";
import { nameOf, useUncertaintyWords } from "./kit-words";
import { WithdrawCertificateSheet } from "./withdraw-certificate-sheet";

type Open = { certificate?: string; withdraw?: string };

/** One instrument: what it is, its certificates and where it has been. */
export function InstrumentScreen() {
  const t = useWords("kit");
  const open = useLocalSearchParams<Open & { instrumentId: string }>();
  const answer = useQuery(kitQueries.instrument(open.instrumentId));
  const instrument = answer.data;
  const show = (next: Open) =>
    router.setParams({ certificate: next.certificate, withdraw: next.withdraw });
  const withdrawn = instrument?.certificates.find(({ id }) => id === open.withdraw);
  return (
    <Screen
      title={instrument ? nameOf(instrument) : t("instrument.title")}
      crumbs={[{ label: t("title"), href: kitPaths.kit }]}
      subtitle={
        instrument
          ? t("instrument.line", {
              kind: t(`kind.${instrument.kind}`),
              serial: instrument.serial,
            })
          : undefined
      }
      actions={
        instrument?.can.edit ? (
          <>
            <Button
              kind="second"
              icon="edit"
              label={t("change")}
              href={kitPaths.editInstrument(instrument.id)}
            />
            <Button
              icon="plus"
              label={t("certificate.add")}
              onPress={() => show({ certificate: "new" })}
            />
          </>
        ) : null
      }
      narrow
    >
      <Answer of={answer} denied={t("denied")}>
        {(found) => (
          <InstrumentBody instrument={found} onWithdraw={(withdraw) => show({ withdraw })} />
        )}
      </Answer>
      {instrument?.can.edit && open.certificate ? (
        <CertificateSheet instrument={instrument} onClose={() => show({})} />
      ) : null}
      {instrument?.can.edit && withdrawn ? (
        <WithdrawCertificateSheet certificate={withdrawn} onClose={() => show({})} />
      ) : null}
    </Screen>
  );
}

function InstrumentBody(props: {
  instrument: Instrument;
  onWithdraw: (certificateId: string) => void;
}) {
  const t = useWords("kit");
  const { instrument, onWithdraw } = props;
  const today = new Date().toISOString().slice(0, 10);
  const facts: Definition[] = [
    { label: t("instrument.serial"), value: instrument.serial, asRead: true },
    ...(instrument.make ? [{ label: t("instrument.make"), value: instrument.make }] : []),
    ...(instrument.range ? [{ label: t("instrument.range"), value: instrument.range }] : []),
    ...(instrument.probeClass
      ? [{ label: t("instrument.probeClass"), value: instrument.probeClass }]
      : []),
    ...(instrument.notes ? [{ label: t("instrument.notes"), value: instrument.notes }] : []),
  ];
  return (
    <View style={{ gap: 24 }}>
      {instrument.archivedAt === null ? null : <Chip label={t("archived")} />}
      {instrument.outOfService === null ? null : (
        <Banner kind="wrong" lead={t("outOfServiceLead")}>
          {instrument.outOfService}
        </Banner>
      )}
      <CalibrationBanner instrument={instrument} today={today} />
      <Card>
        <DefinitionRows label={t("instrument.title")} rows={facts} />
      </Card>
      <Certificates instrument={instrument} today={today} onWithdraw={onWithdraw} />
      <Places instrument={instrument} />
    </View>
  );
}

function CalibrationBanner({ instrument, today }: { instrument: Instrument; today: string }) {
  const t = useWords("kit");
  const format = useFormat();
  const due = certificateToday(instrument, today)?.dueOn ?? null;
  const now = placementNow(instrument.placements);
  const where = now ? t("calibration.whileOn", { tag: now.loopTag }) : null;
  if (instrument.calibration === "dueSoon" && due !== null)
    return (
      <Banner kind="look" lead={t("calibration.soonLead", { count: daysUntil(due, today) })}>
        {where ?? t("calibration.soonDetail", { day: format.day(due, "dayMonthYear") })}
      </Banner>
    );
  if (instrument.calibration === "lapsed" && due !== null)
    return (
      <Banner
        kind="wrong"
        lead={t("calibration.outLead", { day: format.day(due, "dayMonthYear") })}
      >
        {where ?? t("calibration.outDetail")}
      </Banner>
    );
  return null;
}

function Certificates(props: {
  instrument: Instrument;
  today: string;
  onWithdraw: (certificateId: string) => void;
}) {
  const t = useWords("kit");
  const { instrument, today } = props;
  return (
    <View style={{ gap: 8 }}>
      <Text variant="heading">{t("certificate.all")}</Text>
      {instrument.certificates.length === 0 ? (
        <Text tone="ink2">{t("certificate.noneYet")}</Text>
      ) : (
        <>
          <CalibrationBar instrument={instrument} scale={lifeScaleOf([instrument], today)} />
          <CalibrationWords instrument={instrument} today={today} />
          <View role="list" aria-label={t("certificate.all")} style={{ gap: 12 }}>
            {instrument.certificates.map((certificate) => (
              <CertificateCard key={certificate.id} {...props} certificate={certificate} />
            ))}
          </View>
        </>
      )}
    </View>
  );
}

function CertificateCard(props: {
  instrument: Instrument;
  certificate: Certificate;
  onWithdraw: (certificateId: string) => void;
}) {
  const t = useWords("kit");
  const format = useFormat();
  const uncertainty = useUncertaintyWords();
  const { instrument, certificate } = props;
  const withdrawn = certificate.withdrawnAt !== null;
  const accredited =
    certificate.accredited === null
      ? null
      : t(certificate.accredited ? "certificate.accredited" : "certificate.notAccredited");
  const laboratory = [certificate.laboratory, accredited].filter(Boolean).join(", ");
  return (
    <View role="listitem">
      <Card>
        <View style={{ gap: 4 }}>
          <Text variant="subhead">{certificate.number}</Text>
          <Text>{uncertainty(instrument.kind, certificate)}</Text>
          <Text tone="ink2">
            {certificate.dueOn === null
              ? t("certificate.issued", { day: format.day(certificate.issuedOn, "dayMonthYear") })
              : t("certificate.span", {
                  from: format.day(certificate.issuedOn, "dayMonthYear"),
                  to: format.day(certificate.dueOn, "dayMonthYear"),
                })}
          </Text>
          {laboratory ? <Text tone="ink2">{laboratory}</Text> : null}
          <Text variant="small" tone="ink3">
            {t("certificate.recordedBy", { name: certificate.recordedBy })}
          </Text>
          {withdrawn ? (
            <Banner kind="note" lead={t("certificate.withdrawn")}>
              {certificate.withdrawnReason}
            </Banner>
          ) : null}
          {instrument.can.edit && !withdrawn ? (
            <View style={{ alignSelf: "flex-start", marginTop: 6 }}>
              <Button
                kind="second"
                size="dense"
                label={t("certificate.withdraw")}
                said={t("certificate.withdrawSaid", { number: certificate.number })}
                onPress={() => props.onWithdraw(certificate.id)}
              />
            </View>
          ) : null}
        </View>
      </Card>
    </View>
  );
}

function Places({ instrument }: { instrument: Instrument }) {
  const t = useWords("kit");
  const format = useFormat();
  return (
    <View style={{ gap: 4 }}>
      <Text variant="heading">{t("places")}</Text>
      {instrument.placements.length === 0 ? <Text tone="ink2">{t("placesNone")}</Text> : null}
      {instrument.placements.map((place) => (
        <ListRow
          key={place.installationId}
          lead={<LoopTag tag={place.loopTag} service={serviceOf(place)} />}
          title={t("placeAt", { point: place.pointCode, site: place.siteName })}
          detail={t(place.endsAt === null ? "placeSince" : "placeFromTo", {
            from: format.date(Date.parse(place.startsAt), "dayMonthYear"),
            to: place.endsAt ? format.date(Date.parse(place.endsAt), "dayMonthYear") : "",
          })}
          href={evidencePaths.evidence(place.siteId, place.loopId, place.pointId)}
        />
      ))}
    </View>
  );
}
