import { useState } from "react";
import { View } from "react-native";
import { saveFile } from "@features/api";
import { useFormat, useWords } from "@features/i18n";
import {
  Card,
  Dialog,
  Figure,
  Mark,
  ListRow,
  Row,
  Text,
  TextLink,
  useBreakpoint,
} from "@features/ui";
import type { ImportChecks } from "@shared/contracts/import-checks";
import type { ImportDetail } from "@shared/contracts/imports";
import type { PlusMinus } from "@shared/contracts/plus-minus";
import type { Quantity } from "@shared/domain/units/display-units";
import { useWorkings } from "@features/workings/use-workings";
import type { WorkingsKey } from "@features/workings/workings-key";
import { WorkingsOverPage } from "@features/workings/workings-over-page";
import { ChangeChoices } from "./change-choices";
import { CorrectionsMade } from "./corrections-made";
import { DailyEnergy } from "./daily-bars";
import { rawFileAddress } from "./file-card";
import { FindingRow } from "./finding-row";
import { findingsOf } from "./findings";
import { ImportHistory } from "./import-history";
import { importPaths } from "./import-paths";
import type { ImportActions } from "./imports-queries";
import { resultRange, useResultPlusMinus } from "./result-plus-minus";
import { SaveRecipe } from "./recipes/save-recipe";
import { ResultRows } from "./result-rows";
import { SideColumn } from "./side-column";
import { SideRows } from "./side-rows";

/** Step 5: what is in now, what was done to the rows, and the way on. */
export function ResultStep({ detail, actions }: { detail: ImportDetail; actions: ImportActions }) {
  const t = useWords("imports");
  const format = useFormat(detail.site.zone);
  const { checks } = detail;
  const rows = detail.rowsStored ?? 0;
  return (
    <SideColumn
      main={
        <>
          <Row gap={4} align="flex-start">
            <Mark kind="fine" size={36} silent />
            <View style={{ flex: 1, minWidth: 0 }}>
              <Text variant="heading" level={2}>
                {t("result.title", {
                  count: rows,
                  tag: detail.loop.tag,
                })}
              </Text>
              {checks && detail.firstInstant && detail.lastInstant ? (
                <Text variant="bodyWide" tone="ink2">
                  {t("result.summary", {
                    excluded: format.number(checks.rows.excluded, 0),
                    noReading: format.number(checks.rows.noReading, 0),
                    missing: format.number(checks.rows.missing, 0),
                    from: format.dateTime(Date.parse(detail.firstInstant)),
                    to: format.dateTime(Date.parse(detail.lastInstant)),
                  })}
                </Text>
              ) : null}
            </View>
          </Row>
          {checks ? <Energy checks={checks} detail={detail} /> : null}
          {checks ? <WhatWasDone checks={checks} detail={detail} actions={actions} /> : null}
        </>
      }
      side={
        <>
          {checks ? <ResultRows detail={detail} checks={checks} /> : null}
          <CorrectionsMade detail={detail} />
          <NextAndRecord detail={detail} />
        </>
      }
    />
  );
}

function Energy({ checks, detail }: { checks: ImportChecks; detail: ImportDetail }) {
  const t = useWords("imports");
  const plusMinus = useResultPlusMinus(detail);
  const workings = useWorkings();
  const format = useFormat(detail.site.zone);
  const phone = useBreakpoint() === "phone";
  if (!checks.energy) {
    return checks.energyBlockedBy ? (
      <Card pad={5}>
        <Text tone="ink2">{t(`checks.energyNone.${checks.energyBlockedBy}`)}</Text>
      </Card>
    ) : null;
  }
  const { coolingKwh, heatingKwh, volumeM3, suppressedKwh } = checks.energy;
  const counted =
    checks.rows.expected > 0 ? (100 * checks.rows.measured) / checks.rows.expected : null;
  const range = resultRange(detail);
  const opens = (key: WorkingsKey) =>
    range && plusMinus
      ? {
          onOpenWorkings: () => workings.show({ ...key, pointId: detail.point.id, ...range }),
        }
      : {};
  const expanded = (found: PlusMinus | null | undefined, quantity: Quantity) =>
    found ? found.expanded * format.unit(quantity).factor : null;
  const registers = [
    {
      key: "cooling",
      kwh: coolingKwh,
      quantity: "coolingEnergy",
      on: coolingKwh > 0 || detail.loop.service !== "hot",
    },
    {
      key: "heating",
      kwh: heatingKwh,
      quantity: "heatingEnergy",
      on: heatingKwh > 0 || detail.loop.service !== "chilled",
    },
  ] as const;
  return (
    <Card pad={5}>
      <View style={{ gap: 18 }}>
        <View
          style={{
            flexDirection: phone ? "column" : "row",
            justifyContent: "space-between",
            alignItems: phone ? "flex-start" : "flex-end",
            gap: 16,
          }}
        >
          {registers
            .filter((register) => register.on)
            .map((register) => (
              <View key={register.key}>
                <Text variant="bodyWide" tone="ink2">
                  {t(`result.${register.key}`)}
                </Text>
                <Figure
                  size="xl"
                  value={format.toDisplay(register.kwh, register.quantity)}
                  unit={format.unit(register.quantity).unit}
                  uncertainty={expanded(plusMinus?.[register.key].energy, register.quantity)}
                  said={t(`result.${register.key}`)}
                  {...opens({ figure: "energy", register: register.key })}
                />
              </View>
            ))}
          <Row gap={6} align="flex-end">
            {volumeM3 === null ? null : (
              <View>
                <Text variant="small" tone="ink2">
                  {t("result.volume")}
                </Text>
                <Figure
                  size="m"
                  value={format.toDisplay(volumeM3, "volume")}
                  unit={format.unit("volume").unit}
                  uncertainty={expanded(plusMinus?.volume, "volume")}
                  said={t("result.volume")}
                  {...opens({ figure: "volume" })}
                />
              </View>
            )}
            <View>
              <Text variant="small" tone="ink2">
                {t("result.measuredRows")}
              </Text>
              <Figure size="m" value={counted} places={1} unit="%" />
            </View>
          </Row>
        </View>
        {suppressedKwh > 0 ? (
          <Text variant="small" tone="ink2">
            {t("result.suppressed", { energy: format.withUnit(suppressedKwh, "coolingEnergy") })}
          </Text>
        ) : null}
        {(checks.rowsAgainstRegister ?? 0) > 0 ? (
          <Text variant="small" tone="ink2">
            {t("checks.against", { count: checks.rowsAgainstRegister })}
          </Text>
        ) : null}
        <DailyEnergy days={checks.daily} zone={detail.site.zone} />
        <WorkingsOverPage />
      </View>
    </Card>
  );
}

function WhatWasDone(props: {
  checks: ImportChecks;
  detail: ImportDetail;
  actions: ImportActions;
}) {
  const t = useWords("imports");
  const findings = findingsOf(props.checks, props.detail.repair);
  return (
    <Card pad={5} label={t("result.steps")}>
      <View style={{ gap: 16 }}>
        <Text variant="subhead" level={2}>
          {t("result.steps")}
        </Text>
        {findings.length === 0 ? <Text tone="ink2">{t("result.nothingDone")}</Text> : null}
        {findings.map((finding) => (
          <FindingRow key={finding.key} finding={finding} {...props} />
        ))}
      </View>
    </Card>
  );
}

function NextAndRecord({ detail }: { detail: ImportDetail }) {
  const t = useWords("imports");
  const format = useFormat(detail.site.zone);
  return (
    <>
      <View>
        <Text variant="subhead" level={2}>
          {t("result.next")}
        </Text>
        <ListRow
          icon="sites"
          title={t("result.openLoop")}
          detail={`${detail.loop.tag}, ${detail.loop.name}`}
          href={`/loops/${detail.loop.id}`}
        />
        <ListRow
          icon="download"
          title={t("result.another")}
          detail={t("result.anotherHint")}
          href={importPaths.start(detail.point.id)}
        />
        <ChangeChoices detail={detail} />
      </View>
      <View style={{ gap: 8, alignItems: "flex-start" }}>
        {detail.files.map((file) => (
          <SaveRecipe key={file.id} file={file} detail={detail} />
        ))}
      </View>
      <ImportHistory detail={detail} />
      <SideRows
        title={t("result.record")}
        rows={[
          { label: t("result.file"), value: t("result.kept") },
          { label: t("result.by"), value: detail.createdBy },
          {
            label: t("result.at"),
            value: detail.importedAt ? format.dateTime(Date.parse(detail.importedAt)) : "—",
          },
        ]}
      />
      <View style={{ gap: 8 }}>
        {detail.files.map((file) => (
          <View key={file.id} style={{ gap: 2 }}>
            <TextLink
              onPress={() => saveFile(rawFileAddress(detail.id, file.id))}
              label={t("result.download", { name: file.name })}
            />
            <Text variant="asReadS" tone="ink3">
              {`${t("result.hash")} ${file.sha256.slice(0, 16)}…`}
            </Text>
          </View>
        ))}
      </View>
    </>
  );
}

/** Asks before the readings of an import leave the point again. */
export function useUndoDialog(detail: ImportDetail, actions: ImportActions) {
  const t = useWords("imports");
  const [open, setOpen] = useState(false);
  const dialog = (
    <Dialog
      open={open}
      title={t("result.undoDialog.title")}
      confirmLabel={t("result.undoDialog.undo")}
      cancelLabel={t("result.undoDialog.keep")}
      stop
      busy={actions.undo.isPending}
      onClose={() => setOpen(false)}
      onConfirm={() => actions.undo.mutate(undefined, { onSettled: () => setOpen(false) })}
    >
      <Text>
        {t("result.undoDialog.text", { count: detail.rowsStored ?? 0, tag: detail.loop.tag })}
      </Text>
    </Dialog>
  );
  return { dialog, ask: () => setOpen(true) };
}
