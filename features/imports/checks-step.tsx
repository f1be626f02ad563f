import { useState } from "react";
import { View } from "react-native";
import { useFormat, useWords } from "@features/i18n";
import { Card, LoadingBlocks, Mark, QualityStrip, Text, useTheme } from "@features/ui";
import { FailedAnswer } from "@features/api";
import type { ImportChecks } from "@shared/contracts/import-checks";
import type { ImportDetail } from "@shared/contracts/imports";
import { DifferingFacts } from "./file-facts";
import { FindingRow } from "./finding-row";
import { itemsOf, stopsOf } from "./check-items";
import type { ImportActions } from "./imports-queries";
import { ProgressView } from "./progress-view";
import { ReadingFinding } from "./reading-finding";
import { RowCounts } from "./row-counts";
import { SideColumn } from "./side-column";
import { SideRows, type SideRow } from "./side-rows";
import { useChecksWhenAnswered } from "./time-step";

/** Step 4: what was found, in order of weight, each with its choices. */
export function ChecksStep({ detail, actions }: { detail: ImportDetail; actions: ImportActions }) {
  const t = useWords("imports");
  useChecksWhenAnswered(detail, actions);
  const checks = useLastChecks(detail);
  if (!checks) {
    if (detail.state === "checking") return <ProgressView detail={detail} actions={actions} />;
    const { error } = actions.check;
    if (error) return <FailedAnswer error={error} onRetry={() => actions.check.mutate()} />;
    return <LoadingBlocks label={t("checks.working")} blocks={[{ width: "100%", height: 320 }]} />;
  }
  return (
    <SideColumn
      main={
        <>
          <DifferingFacts detail={detail} />
          <Findings detail={detail} checks={checks} actions={actions} />
        </>
      }
      side={<Sides detail={detail} checks={checks} />}
    />
  );
}

/** What the last check found stays on the screen while the next one runs. */
function useLastChecks({ id, checks }: ImportDetail): ImportChecks | null {
  const [last, setLast] = useState({ id, checks });
  if (checks !== null && checks !== last.checks) setLast({ id, checks });
  else if (last.id !== id) setLast({ id, checks });
  return checks ?? (last.id === id ? last.checks : null);
}

interface FindingsProps {
  readonly detail: ImportDetail;
  readonly checks: ImportChecks;
  readonly actions: ImportActions;
}

function Findings({ detail, checks, actions }: FindingsProps) {
  const t = useWords("imports");
  const words = useWords("findings");
  const { colour } = useTheme();
  const items = itemsOf(checks, detail.repair);
  const stops = stopsOf(checks, detail.repair);
  const more = checks.moreFindings ?? 0;
  return (
    <Card pad={0} label={t("checks.found", { count: items.length })}>
      <View
        style={{
          flexDirection: "row",
          flexWrap: "wrap",
          justifyContent: "space-between",
          gap: 8,
          padding: 20,
        }}
      >
        <Text variant="heading" level={2}>
          {items.length === 0 || stops > 0
            ? t("checks.title", { count: stops })
            : t("checks.found", { count: items.length })}
        </Text>
        <View role="status">
          <Text variant="bodyWide" tone="ink2">
            {detail.checks === null ? words("again") : t("checks.stops", { count: stops })}
          </Text>
        </View>
      </View>
      {items.map((item) => (
        <View
          key={item.key}
          style={{
            padding: 20,
            borderTopWidth: 1,
            borderTopColor: colour.rule,
            backgroundColor: item.weight === "stop" ? colour.madderFaint : undefined,
          }}
        >
          {item.kind === "reading" ? (
            <ReadingFinding finding={item.finding} detail={detail} actions={actions} />
          ) : (
            <FindingRow finding={item.finding} detail={detail} checks={checks} actions={actions} />
          )}
        </View>
      ))}
      {more > 0 ? (
        <View style={{ padding: 20 }}>
          <Text tone="ink2">{words("more", { count: more })}</Text>
        </View>
      ) : null}
    </Card>
  );
}

function Sides({ detail, checks }: { detail: ImportDetail; checks: ImportChecks }) {
  const t = useWords("imports");
  const words = useWords("findings");
  const format = useFormat(detail.site.zone);
  const energy: SideRow[] = [];
  if (checks.energy) {
    const { coolingKwh, heatingKwh, volumeM3, suppressedKwh, coveredS } = checks.energy;
    if (coolingKwh > 0 || detail.loop.service !== "hot") {
      energy.push({
        label: t("result.coolingShort"),
        value: format.withUnit(coolingKwh, "coolingEnergy"),
      });
    }
    if (heatingKwh > 0 || detail.loop.service !== "chilled") {
      energy.push({
        label: t("result.heatingShort"),
        value: format.withUnit(heatingKwh, "heatingEnergy"),
      });
    }
    if (volumeM3 !== null)
      energy.push({ label: t("result.volume"), value: format.withUnit(volumeM3, "volume") });
    energy.push({ label: t("result.coveredShort"), value: format.duration(coveredS) });
    if (suppressedKwh > 0) {
      energy.push({
        label: t("result.suppressedShort"),
        value: format.withUnit(suppressedKwh, "coolingEnergy"),
      });
    }
  }
  const { picture } = checks;
  const part = (instant: string) =>
    picture
      ? (Date.parse(instant) - Date.parse(picture.from)) /
        Math.max(1, Date.parse(picture.to) - Date.parse(picture.from))
      : 0;
  return (
    <>
      <View>
        <Text variant="subhead" level={2}>
          {t("checks.rowsTitle")}
        </Text>
        {picture ? (
          <View style={{ marginTop: 12 }}>
            <QualityStrip
              label={t("checks.rowsTitle")}
              height={16}
              stretches={picture.quality.map((stretch) => ({
                from: part(stretch.from),
                to: part(stretch.to),
                quality: stretch.kind,
              }))}
            />
          </View>
        ) : null}
        <RowCounts rows={checks.rows} withoutTemperature={checks.rowsWithoutTemperature} />
      </View>
      {energy.length > 0 ? <SideRows title={t("checks.energy")} rows={energy} /> : null}
      {checks.energyBlockedBy ? (
        <Text tone="ink2">{t(`checks.energyNone.${checks.energyBlockedBy}`)}</Text>
      ) : null}
      {(checks.rowsOutsideFluid ?? 0) > 0 && checks.liquidC ? (
        <Text tone="ink2">
          {t("checks.outsideFluid", {
            count: checks.rowsOutsideFluid,
            lowest: format.withUnit(checks.liquidC.lowest, "temperature", 1),
            highest: format.withUnit(checks.liquidC.highest, "temperature", 1),
          })}
        </Text>
      ) : null}
      {(checks.rowsAgainstRegister ?? 0) > 0 ? (
        <Text tone="ink2">{t("checks.against", { count: checks.rowsAgainstRegister })}</Text>
      ) : null}
      <NotChecked detail={detail} checks={checks} />
      {checks.clean.length > 0 ? (
        <SideRows
          title={t("checks.clean", { count: checks.clean.length })}
          rows={checks.clean.map((name) => ({
            label: words(`clean.${name}`, {
              defaultValue: t(`checks.cleanName.${name}`, { defaultValue: name }),
            }),
            value: "",
            lead: <Mark kind="fine" size={18} silent />,
          }))}
        />
      ) : null}
    </>
  );
}

/** Silence is never soundness: what could not be looked at, and why. */
function NotChecked({ detail, checks }: { detail: ImportDetail; checks: ImportChecks }) {
  const t = useWords("findings");
  const missing = checks.notChecked ?? [];
  if (missing.length === 0) return null;
  const several = detail.files.length > 1;
  const nameOf = (fileId: string | null) =>
    several ? (detail.files.find(({ id }) => id === fileId)?.name ?? "") : "";
  return (
    <SideRows
      title={t("notChecked.title", { count: missing.length })}
      rows={missing.map(({ check, lacks, fileId }) => ({
        label: t("notChecked.because", {
          check: t(`notChecked.check.${check}`),
          lacks: t(`notChecked.lacks.${lacks}`),
        }),
        value: nameOf(fileId),
        lead: <Mark kind="note" size={18} silent />,
      }))}
    />
  );
}
