import { View } from "react-native";

import type { MeasuredBy } from "@shared/contracts/energy";
import { useWords } from "@features/i18n";
import { comparePaths } from "@features/compare/compare-paths";
import { evidencePaths } from "@features/evidence/evidence-paths";
import { MarkedText, Text, TextLink, useTheme } from "@features/ui";

import type { LoopFigures } from "./loop-context";
import { leading } from "./supporting-figures";

/** Kit that speaks for the range, how its certificates stood, and what the ± of the energy stands on. */
export function MeasuredBySection(props: LoopFigures) {
  const { summary, site, loop, point, range } = props;
  const t = useWords("loops");
  const { evidence } = summary;
  if (evidence === null) return null;
  const { installations } = evidence;
  const basis = summary.plusMinus[leading(props)].energy?.basis ?? null;
  const at = [site.id, loop.id, point.id] as const;
  return (
    <View>
      <Text variant="subhead" level={3} style={{ marginBottom: 6 }}>
        {t("measuredBy.title")}
      </Text>
      {installations.length === 0 ? (
        <Text tone="ink2">{t(basis === null ? "measuredBy.none" : "measuredBy.usual")}</Text>
      ) : (
        <>
          <View role="list" aria-label={t("measuredBy.title")}>
            {installations.map((one) => (
              <Kit key={one.installationId} {...props} kit={one} dated={installations.length > 1} />
            ))}
          </View>
          {basis === null ? null : (
            <Text variant="small" tone="ink2" style={{ marginTop: 6 }}>
              {t(`measuredBy.basis.${basis}`)}
            </Text>
          )}
        </>
      )}
      <View
        style={{ flexDirection: "row", flexWrap: "wrap", columnGap: 16, rowGap: 12, marginTop: 8 }}
      >
        {installations.length > 0 ? (
          <TextLink label={t("measuredBy.evidence")} href={evidencePaths.evidence(...at)} />
        ) : evidence.can.record ? (
          <TextLink label={t("measuredBy.record")} href={evidencePaths.newInstallation(...at)} />
        ) : null}
        <TextLink
          label={t("measuredBy.compare")}
          href={comparePaths.newMeters(site.id, {
            pointId: point.id,
            register: loop.service === "changeover" ? undefined : leading(props),
            range,
          })}
        />
      </View>
    </View>
  );
}

/** One installation; its dates where several speak for the range. */
function Kit({ kit, dated, format }: LoopFigures & { kit: MeasuredBy; dated: boolean }) {
  const t = useWords("loops");
  const { flowMeter, probes } = kit;
  const checked =
    probes && probes.checkedOn !== null
      ? t("measuredBy.checked", { day: format.day(probes.checkedOn, "dayMonthYear") })
      : null;
  const from = format.dateTime(Date.parse(kit.from));
  return (
    <>
      {dated ? (
        <View role="listitem">
          <Text variant="small" tone="ink3" style={{ marginTop: 6 }}>
            {kit.to === null
              ? t("measuredBy.since", { from })
              : t("measuredBy.span", { from, to: format.dateTime(Date.parse(kit.to)) })}
          </Text>
        </View>
      ) : null}
      {kit.meterClass === null ? null : (
        <Part
          serial={t("measuredBy.meterClass", { meterClass: kit.meterClass })}
          what={t("measuredBy.plate")}
          none=""
          state={t("measuredBy.ownPower")}
          look={false}
        />
      )}
      {kit.meterClass !== null && flowMeter === null ? null : (
        <Part
          serial={flowMeter?.serial ?? null}
          what={t("measuredBy.flowMeter")}
          none={t("measuredBy.noFlowMeter")}
          {...certificateWords()}
        />
      )}
      {kit.meterClass !== null && probes === null ? null : (
        <Part
          serial={probes && `${probes.supplySerial}, ${probes.returnSerial}`}
          what={t("measuredBy.probes")}
          none={t("measuredBy.noProbes")}
          state={checked ?? t("measuredBy.notChecked")}
          look={checked === null}
        />
      )}
    </>
  );

  function certificateWords(): { state: string; look: boolean } {
    const certificate = flowMeter?.certificate ?? null;
    if (certificate === null) return { state: t("measuredBy.noCertificate"), look: true };
    const { dueOn, state } = certificate;
    if (dueOn === null) return { state: t("measuredBy.openEnded"), look: false };
    const day = format.day(dueOn, "dayMonthYear");
    return state === "lapsed"
      ? { state: t("measuredBy.lapsed", { day }), look: true }
      : { state: t("measuredBy.inDate", { day }), look: false };
  }
}

function Part(props: {
  serial: string | null;
  what: string;
  none: string;
  state: string;
  look: boolean;
}) {
  const { colour } = useTheme();
  return (
    <View
      role="listitem"
      style={{
        flexDirection: "row",
        flexWrap: "wrap",
        columnGap: 12,
        justifyContent: "space-between",
        alignItems: "center",
        paddingVertical: 9,
        borderTopWidth: 1,
        borderTopColor: colour.rule,
      }}
    >
      {props.serial === null ? (
        <Text tone="ink2">{props.none}</Text>
      ) : (
        <>
          <View style={{ flexShrink: 1 }}>
            <Text variant="label">{props.serial}</Text>
            <Text variant="small" tone="ink3">
              {props.what}
            </Text>
          </View>
          <View style={{ flexShrink: 1 }}>
            {props.look ? (
              <MarkedText kind="look" variant="small">
                {props.state}
              </MarkedText>
            ) : (
              <Text variant="small" tone="ink2">
                {props.state}
              </Text>
            )}
          </View>
        </>
      )}
    </View>
  );
}
