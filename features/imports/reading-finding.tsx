import { View } from "react-native";
import type { ImportFinding } from "@shared/contracts/import-findings";
import type { ImportDetail } from "@shared/contracts/imports";
import { useFormat, useWords } from "@features/i18n";
import { placesPaths } from "@features/places/places-paths";
import { ChoiceTiles, Mark, Text, TextLink, useBreakpoint } from "@features/ui";
import { isSettled } from "./check-items";
import { FindingLines } from "./finding-lines";
import { FindingSpans } from "./finding-spans";
import { pickable, useChoiceWords } from "./finding-worth";
import type { ImportActions } from "./imports-queries";
import { useReadingFindingWords } from "./reading-finding-words";

const PICTURE_WIDTH = 200;

interface ReadingFindingProps {
  readonly finding: ImportFinding;
  readonly detail: ImportDetail;
  readonly actions: ImportActions;
}

/** What the readings show: a picture of it, and each choice with the energy it is worth. */
export function ReadingFinding({ finding, detail, actions }: ReadingFindingProps) {
  const words = useReadingFindingWords(detail)(finding);
  const phone = useBreakpoint() === "phone";
  return (
    <View style={{ gap: 12 }}>
      <View style={{ flexDirection: phone ? "column" : "row", gap: phone ? 12 : 20 }}>
        <View style={{ flexDirection: "row", gap: 12, flex: phone ? undefined : 1, minWidth: 0 }}>
          <Mark kind={markOf(finding, detail.repair)} size={22} />
          <View style={{ flex: 1, minWidth: 0, gap: 2 }}>
            <Text variant="subhead" level={3}>
              {words.title}
            </Text>
            <Text variant="bodyWide" tone="ink2">
              {words.text}
            </Text>
          </View>
        </View>
        {finding.picture ? (
          <View style={{ width: phone ? undefined : PICTURE_WIDTH }}>
            <FindingLines
              finding={finding}
              zone={detail.site.zone}
              stops={finding.weight === "stop" && !isSettled(finding, detail.repair)}
            />
          </View>
        ) : null}
      </View>
      <Choices finding={finding} detail={detail} actions={actions} title={words.title} />
      <CutOff finding={finding} detail={detail} />
    </View>
  );
}

function markOf(finding: ImportFinding, repair: ImportDetail["repair"]) {
  const weight = isSettled(finding, repair) ? "look" : finding.weight;
  return ({ stop: "wrong", look: "look", note: "note" } as const)[weight];
}

function Choices(props: ReadingFindingProps & { readonly title: string }) {
  const { finding, detail, actions, title } = props;
  const t = useWords("findings");
  const phone = useBreakpoint() === "phone";
  const words = useChoiceWords(detail);
  const choices = pickable(finding);
  if (choices.length < 2) return null;
  // What was just chosen is shown at once, while the check of it runs.
  const picked = detail.repair.findings?.[finding.key] ?? finding.chosen;
  const kept = detail.repair.keptSpans?.[finding.key] ?? finding.keptSpans;
  if (!detail.can.edit) {
    const made = choices.find(({ key }) => key === picked);
    return made ? (
      <Text variant="subhead" level="none">
        {words.name(made)}
      </Text>
    ) : null;
  }
  return (
    <View style={{ gap: 8, paddingLeft: phone ? 0 : 34 }}>
      <ChoiceTiles
        label={t("choice.label", { title })}
        labelHidden
        columns={phone ? 1 : choices.length === 2 ? 2 : 3}
        value={choices.some(({ key }) => key === picked) ? picked : null}
        required={finding.weight === "stop"}
        choices={choices.map((choice) => ({
          value: choice.key,
          label: words.name(choice),
          detail: words.detail(choice),
        }))}
        onChange={(key) => actions.chooseRepairs.mutate({ findings: { [finding.key]: key } })}
      />
      {picked === "exclude" && finding.spanCount > 1 ? (
        <FindingSpans
          finding={finding}
          title={title}
          zone={detail.site.zone}
          kept={kept}
          onKept={(starts) =>
            actions.chooseRepairs.mutate({ keptSpans: { [finding.key]: [...starts] } })
          }
        />
      ) : null}
    </View>
  );
}

function CutOff({ finding, detail }: { finding: ImportFinding; detail: ImportDetail }) {
  const t = useWords("findings");
  const format = useFormat();
  const phone = useBreakpoint() === "phone";
  const cutOff = finding.choices.find(({ change }) => change === "cutOff")?.cutOff;
  if (!cutOff) return null;
  const flow = format.withUnit(cutOff.flowM3PerHour, "flow");
  return (
    <View style={{ gap: 4, paddingLeft: phone ? 0 : 34 }}>
      <Text variant="bodyWide">
        {cutOff.suppressedKwh === null
          ? t("cutOff.saysUnknown", { flow })
          : t("cutOff.says", {
              flow,
              energy: format.withUnit(cutOff.suppressedKwh, "coolingEnergy"),
            })}
      </Text>
      <TextLink
        label={t("cutOff.open")}
        href={placesPaths.editLoop(detail.site.id, detail.loop.id)}
      />
    </View>
  );
}
