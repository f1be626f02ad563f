import { useQuery } from "@tanstack/react-query";
import { router, useLocalSearchParams } from "expo-router";
import { View } from "react-native";
import type { Installation } from "@shared/contracts/evidence";
import type { Loop, Site } from "@shared/contracts/places";
import { Answer } from "@features/api";
import { comparePaths } from "@features/compare/compare-paths";
import { useFormat, useWords, type Format } from "@features/i18n";
import {
  Banner,
  Button,
  Card,
  EmptyState,
  LoopTag,
  Screen,
  Text,
  TextLink,
  useBreakpoint,
} from "@features/ui";
import { BoreCorrection } from "./bore-correction";
import { BudgetList } from "./budget-list";
import { evidencePaths } from "./evidence-paths";
import { evidenceQueries } from "./evidence-queries";
import { Indicative } from "./installation-form-screen";
import { InstallationRecord } from "./installation-record";
import { tagService } from "./tag-service";
import { usePointCrumbs } from "./use-point-crumbs";
import { VerdictList } from "./verdict-list";
import { VersionList } from "./version-list";
import { whenOf } from "./when-of";
import { WithdrawSheet } from "./withdraw-sheet";

const registerOf = { chilled: "cooling", hot: "heating", changeover: undefined } as const;

type Params = {
  siteId: string;
  loopId: string;
  pointId: string;
  version?: string;
  withdraw?: string;
};

/** How a point was measured: the record that stands, what it comes to, and every version before. */
export function EvidenceScreen() {
  const t = useWords("installation");
  const params = useLocalSearchParams<Params>();
  const { siteId, loopId, pointId } = params;
  const site = useQuery(evidenceQueries.site(siteId));
  const loop = useQuery(evidenceQueries.loop(loopId));
  const point = useQuery(evidenceQueries.point(pointId));
  const known = useQuery(evidenceQueries.installations(pointId));
  const crumbs = usePointCrumbs({ site: site.data, loop: loop.data, point: point.data });
  const waiting = [site, loop, point].find(({ data }) => data === undefined) ?? known;
  const add = (
    <Button
      icon="plus"
      label={t("add")}
      href={evidencePaths.newInstallation(siteId, loopId, pointId)}
    />
  );
  return (
    <Screen
      title={point.data ? t("titleOf", { code: point.data.code }) : t("title")}
      crumbs={crumbs}
      tag={
        loop.data ? (
          <LoopTag tag={loop.data.tag} service={tagService(loop.data.service)} size="l" />
        ) : undefined
      }
      subtitle={point.data?.name}
      actions={known.data?.can.create ? add : null}
    >
      <Answer
        of={{ ...waiting, data: site.data && loop.data && point.data && known.data }}
        denied={t("denied")}
      >
        {(answer) =>
          site.data && loop.data ? (
            <View style={{ gap: 20 }}>
              <EvidenceBody
                site={site.data}
                loop={loop.data}
                params={params}
                items={answer.items}
                defaultBudget={answer.defaultBudget}
                add={answer.can.create ? add : undefined}
              />
              {/* Whoever reads evidence may compare; not everybody's navigation lists it. */}
              <TextLink
                label={t("compare")}
                href={comparePaths.newMeters(siteId, {
                  pointId,
                  register: registerOf[loop.data.service],
                })}
              />
            </View>
          ) : null
        }
      </Answer>
    </Screen>
  );
}

function EvidenceBody(props: {
  site: Site;
  loop: Loop;
  params: Params;
  items: readonly Installation[];
  defaultBudget: Installation["budget"];
  add: React.ReactElement | undefined;
}) {
  const t = useWords("installation");
  const { site, params, items, defaultBudget } = props;
  const format = useFormat(site.zone, site.unitSystem);
  const stands = items.filter((one) => one.supersededAt === null && one.withdrawnAt === null);
  const shown = items.find(({ id }) => id === params.version) ?? stands[0] ?? null;
  const withdrawn = items.find(({ id }) => id === params.withdraw);
  if (shown === null)
    return (
      <View style={{ gap: 20 }}>
        <EmptyState title={t("none")} detail={t("noneDetail")} action={props.add} />
        <Card label={t("budget.defaults")}>
          <View style={{ gap: 12 }}>
            <Text variant="heading">{t("budget.defaults")}</Text>
            <BudgetList budget={defaultBudget} format={format} />
          </View>
        </Card>
        <VersionList {...props} shown={null} format={format} />
      </View>
    );
  return (
    <View style={{ gap: 20 }}>
      <Shown {...props} shown={shown} format={format} />
      {withdrawn?.can.edit ? (
        <WithdrawSheet
          installation={withdrawn}
          onClose={() => router.setParams({ withdraw: undefined })}
        />
      ) : null}
    </View>
  );
}

function Shown(
  props: Parameters<typeof EvidenceBody>[0] & { shown: Installation; format: Format },
) {
  const t = useWords("installation");
  const { shown, format, params } = props;
  const wide = useBreakpoint() === "wide";
  const ids = { siteId: params.siteId, loopId: params.loopId, pointId: params.pointId };
  return (
    <View style={{ flexDirection: wide ? "row" : "column", gap: 20, alignItems: "flex-start" }}>
      <View style={{ flex: wide ? 1 : undefined, width: wide ? undefined : "100%", gap: 16 }}>
        <Standing installation={shown} format={format} />
        {shown.indicativeOnly ? <Indicative /> : null}
        <Card label={t("verdicts")}>
          <View style={{ gap: 12 }}>
            <Text variant="heading">{t("verdicts")}</Text>
            <VerdictList verdicts={shown.verdicts} format={format} />
            {shown.can.edit && shown.verdicts.some(({ code }) => code === "boreEnteredDiffers") ? (
              <BoreCorrection
                enteredMm={shown.enteredBoreMm}
                trueMm={shown.bore?.insideDiameterMm ?? null}
                format={format}
                at={ids}
              />
            ) : null}
          </View>
        </Card>
        <InstallationRecord installation={shown} format={format} />
        {shown.can.edit ? (
          <View style={{ flexDirection: "row", flexWrap: "wrap", gap: 12 }}>
            <Button
              kind="second"
              icon="edit"
              label={t("correctThis")}
              href={evidencePaths.correctInstallation(
                ids.siteId,
                ids.loopId,
                ids.pointId,
                shown.id,
              )}
            />
            <Button
              kind="second"
              label={t("withdraw")}
              onPress={() => router.setParams({ withdraw: shown.id })}
            />
          </View>
        ) : null}
        <VersionList {...props} />
      </View>
      <View style={{ width: wide ? 372 : "100%" }}>
        <Card label={t("budget.title")}>
          <View style={{ gap: 12 }}>
            <Text variant="heading">{t("budget.title")}</Text>
            <BudgetList budget={shown.budget} format={format} />
          </View>
        </Card>
      </View>
    </View>
  );
}

/** Says where a version no longer stands, and otherwise who recorded it and when. */
function Standing({ installation, format }: { installation: Installation; format: Format }) {
  const t = useWords("installation");
  const at = whenOf(format);
  const { withdrawnAt, supersededAt } = installation;
  return (
    <View style={{ gap: 8 }}>
      <Text variant="heading">
        {installation.endsAt === null
          ? t("span.open", { from: at(installation.startsAt) })
          : t("span.closed", { from: at(installation.startsAt), to: at(installation.endsAt) })}
      </Text>
      <Text tone="ink2">
        {t("recorded", {
          version: installation.version,
          name: installation.recordedBy,
          when: at(installation.recordedAt),
        })}
      </Text>
      {installation.reason ? (
        <Text tone="ink2">{t("because", { reason: installation.reason })}</Text>
      ) : null}
      {supersededAt === null ? null : (
        <Banner kind="look" lead={t("superseded")}>
          {t("supersededDetail", { when: at(supersededAt) })}
        </Banner>
      )}
      {withdrawnAt === null ? null : (
        <Banner kind="look" lead={t("withdrawn")}>
          {t("withdrawnDetail", {
            when: at(withdrawnAt),
            name: installation.withdrawnBy ?? "",
            reason: installation.withdrawnReason ?? "",
          })}
        </Banner>
      )}
    </View>
  );
}
