import { View } from "react-native";
import { useFormat, useWords } from "@features/i18n";
import { Mark, Segments, Spark, Text, useBreakpoint } from "@features/ui";
import type { ImportChecks, RepairStepView } from "@shared/contracts/import-checks";
import type { ImportDetail } from "@shared/contracts/imports";
import { isUnclear, type ChoiceName, type Finding } from "./findings";
import type { ImportActions } from "./imports-queries";

const MARKS = { stop: "wrong", look: "look", note: "note" } as const;
const EXAMPLES_SHOWN = 3;

const OPTIONS = {
  identicalRepeats: ["dropRepeats", "leaveOutAll"],
  conflictingRepeats: ["keepFirst", "keepLast", "leaveOutAll"],
  outOfOrder: ["sort", "leaveOut"],
  sentinels: ["noReading", "asWritten"],
  missingHour: ["leaveOut", "readAsBeforeChange"],
  weakSignal: ["exclude", "keep"],
  overlap: ["keepEarlier", "useThis"],
} as const satisfies Record<ChoiceName, readonly string[]>;

interface FindingProps {
  readonly finding: Finding;
  readonly detail: ImportDetail;
  readonly checks: ImportChecks;
  readonly actions: ImportActions;
}

/** One finding: its mark, what it is, a small picture where there is one, and its choices. */
export function FindingRow({ finding, detail, checks, actions }: FindingProps) {
  const t = useWords("imports");
  const phone = useBreakpoint() === "phone";
  const words = useFindingWords(finding, detail);
  const choice = finding.what.kind === "step" ? finding.what.choice : null;
  return (
    <View style={{ flexDirection: phone ? "column" : "row", gap: phone ? 12 : 20 }}>
      <View style={{ flexDirection: "row", gap: 12, flex: phone ? undefined : 1, minWidth: 0 }}>
        <Mark kind={MARKS[finding.weight]} size={22} />
        <View style={{ flex: 1, minWidth: 0, gap: 2 }}>
          <Text variant="subhead" level={3}>
            {words.title}
          </Text>
          <Text variant="bodyWide" tone="ink2">
            {words.text}
          </Text>
          {words.examples ? (
            <Text variant="asReadS" tone="ink2">
              {words.examples}
            </Text>
          ) : null}
        </View>
      </View>
      {finding.what.kind === "gap" ? (
        <View style={{ width: phone ? undefined : 160 }}>
          <GapPicture gap={finding.what.gap} checks={checks} label={t("checks.picture")} />
        </View>
      ) : null}
      {choice ? <RepairChoice choice={choice} detail={detail} actions={actions} /> : null}
    </View>
  );
}

function RepairChoice(props: { choice: ChoiceName; detail: ImportDetail; actions: ImportActions }) {
  const { choice, detail, actions } = props;
  const t = useWords("imports");
  const phone = useBreakpoint() === "phone";
  const label = t(`checks.choice.${choice}.label`);
  const options: readonly string[] = OPTIONS[choice];
  if (!detail.can.edit) {
    const made = detail.repair[choice];
    return made ? (
      <Text variant="subhead" level="none">
        {t(`checks.choice.${choice}.${made}`)}
      </Text>
    ) : null;
  }
  return (
    <View style={{ alignSelf: phone ? "stretch" : "center" }}>
      <Segments
        label={label}
        full={phone}
        value={detail.repair[choice]}
        options={options.map((value) => ({ value, label: t(`checks.choice.${choice}.${value}`) }))}
        onChange={(value) => actions.chooseRepairs.mutate({ [choice]: value })}
      />
    </View>
  );
}

function GapPicture(props: {
  gap: ImportChecks["files"][number]["gaps"][number];
  checks: ImportChecks;
  label: string;
}) {
  const { picture } = props.checks;
  if (!picture) return null;
  const fromMs = Date.parse(picture.from);
  const spanMs = Math.max(1, Date.parse(picture.to) - fromMs);
  const count = picture.flowM3PerHour.length;
  const place = (instant: string) => ((Date.parse(instant) - fromMs) / spanMs) * count;
  const start = place(props.gap.from);
  const end = place(props.gap.to);
  const reach = Math.max(12, end - start);
  const first = Math.max(0, Math.floor(start - reach));
  const last = Math.min(count, Math.ceil(end + reach));
  const shown = Math.max(1, last - first);
  return (
    <Spark
      label={props.label}
      values={picture.flowM3PerHour.slice(first, last).map((value) => value ?? NaN)}
      highlight={{ from: (start - first) / shown, to: (end - first) / shown, tone: "look" }}
    />
  );
}

function useFindingWords(finding: Finding, detail: ImportDetail) {
  const t = useWords("imports");
  const format = useFormat(detail.site.zone);
  const several = detail.files.length > 1;
  const file = detail.files.find((entry) => entry.id === finding.fileId);
  const inFile = several && file ? ` ${t("checks.step.inFile", { name: file.name })}` : "";
  const { what } = finding;
  switch (what.kind) {
    case "gap":
      return {
        title: t("checks.step.gap.title", { count: what.gap.missingRows }),
        text:
          t("checks.step.gap.text", {
            from: format.dateTime(Date.parse(what.gap.from)),
            to: format.dateTime(Date.parse(what.gap.to)),
          }) + inFile,
        examples: null,
      };
    case "moreGaps":
      return {
        title: t("checks.step.gapsMore", { count: what.count }),
        text: t("checks.step.gapsMoreText") + inFile,
        examples: null,
      };
    case "step":
      return {
        title: t(`checks.step.${what.step.code}.title`, {
          count: what.step.count,
          percent: detail.repair.weakSignalBelowPercent,
        }),
        text:
          t(`checks.step.${what.step.code}.text`, { kinds: kindsText(what.step) }) +
          (isUnclear(what.step) ? ` ${t("checks.step.repeatedHour.unclear")}` : "") +
          inFile,
        examples: exampleText(what.step),
      };
  }

  function kindsText(step: RepairStepView): string {
    return Object.entries(step.countByKind)
      .map(([kind, count]) => `${kind || t("checks.emptyCell")}: ${format.number(count, 0)}`)
      .join(", ");
  }

  function exampleText(step: RepairStepView): string | null {
    if (step.examples.length === 0 || step.code === "unitConversion") return null;
    const shown = step.examples
      .slice(0, EXAMPLES_SHOWN)
      .map(({ line, cell }) =>
        cell === null ? t("checks.example", { line }) : t("checks.exampleCell", { line, cell }),
      );
    const more = step.count - shown.length;
    if (more > 0) shown.push(t("checks.examplesMore", { count: more }));
    return shown.join(" · ");
  }
}
