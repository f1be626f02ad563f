import { View } from "react-native";
import { useFormat, useWords } from "@features/i18n";
import { Card, Mark, Text, TextLink, useTheme, type MarkKind } from "@features/ui";
import { evidencePaths, type TakenOver } from "@features/evidence/evidence-paths";
import type { FileFact, ImportDetail, ImportFile } from "@shared/contracts/imports";

/** What the lines above the header say, held against the record of the point. */
export function FactsOfFile({ file, detail }: { file: ImportFile; detail: ImportDetail }) {
  const t = useWords("imports");
  if (file.facts.length === 0) return null;
  const taken = takenOver(file, detail);
  const { site, loop, point } = detail;
  return (
    <View>
      <Text variant="subhead" level={2}>
        {t("facts.title")}
      </Text>
      <View role="list" aria-label={t("facts.of", { name: file.name })} style={{ marginTop: 6 }}>
        {file.facts.map((fact) => (
          <FactRow key={`${fact.line} ${fact.kind} ${fact.cell}`} fact={fact} />
        ))}
      </View>
      {taken ? (
        <View style={{ gap: 4, marginTop: 8 }}>
          <TextLink
            label={t("facts.takeOver")}
            href={evidencePaths.takeOver(site.id, loop.id, point.id, file.heldAgainst, taken)}
          />
          <Text variant="small" tone="ink2">
            {t("facts.takeOverHint")}
          </Text>
        </View>
      ) : null}
      {file.facts.some(({ verdict }) => verdict === "differs") ? (
        <View style={{ marginTop: 8 }}>
          <TextLink
            label={t("facts.openEvidence")}
            href={evidencePaths.evidence(site.id, loop.id, point.id)}
          />
        </View>
      ) : null}
    </View>
  );
}

/** Facts that differ, as the Checks step names them. Nothing where all agree. */
export function DifferingFacts({ detail }: { detail: ImportDetail }) {
  const t = useWords("imports");
  const differing = detail.files.flatMap((file) =>
    file.facts.filter(({ weight }) => weight !== null).map((fact) => ({ file, fact })),
  );
  if (differing.length === 0) return null;
  const { site, loop, point } = detail;
  return (
    <Card label={t("facts.differ")}>
      <Text variant="heading" level={2}>
        {t("facts.differ")}
      </Text>
      <View role="list" aria-label={t("facts.differ")} style={{ marginTop: 6 }}>
        {differing.map(({ file, fact }) => (
          <FactRow
            key={`${file.id} ${fact.line} ${fact.kind} ${fact.cell}`}
            fact={fact}
            fileName={detail.files.length > 1 ? file.name : undefined}
          />
        ))}
      </View>
      <View style={{ marginTop: 8 }}>
        <TextLink
          label={t("facts.openEvidence")}
          href={evidencePaths.evidence(site.id, loop.id, point.id)}
        />
      </View>
    </Card>
  );
}

const MARKS: Readonly<Record<FileFact["verdict"], MarkKind>> = {
  matches: "fine",
  differs: "look",
  notRecorded: "note",
  unclear: "note",
  shown: "note",
};

function FactRow({ fact, fileName }: { fact: FileFact; fileName?: string }) {
  const t = useWords("imports");
  const format = useFormat();
  const { colour } = useTheme();
  const kind = fact.weight === "stop" ? "wrong" : MARKS[fact.verdict];
  const recorded =
    typeof fact.recorded === "number"
      ? t(`facts.unit.${fact.kind}`, {
          value: format.number(fact.recorded, decimalsOf(fact.recorded)),
        })
      : fact.kind === "fluid" && fact.recorded
        ? t(`facts.fluid.${fact.recorded}`)
        : fact.recorded;
  const sentence =
    fact.verdict === "differs"
      ? t(fact.kind === "boreMm" ? "facts.boreDiffers" : "facts.differs", { recorded })
      : fact.verdict === "unclear" && recorded !== null
        ? t("facts.unclearBeside", { recorded })
        : t(`facts.${fact.verdict}`);
  return (
    <View
      role="listitem"
      style={{ paddingVertical: 8, borderTopWidth: 1, borderTopColor: colour.rule, gap: 2 }}
    >
      <View style={{ flexDirection: "row", gap: 12, alignItems: "center" }}>
        <View style={{ flex: 1, minWidth: 0 }}>
          <Text variant="bodyWide" tone="ink2">
            {t(`facts.kind.${fact.kind}`)}
          </Text>
        </View>
        <View style={{ flexShrink: 1 }}>
          <Text variant="asReadM" align="right">
            {fact.cell}
          </Text>
        </View>
      </View>
      <View style={{ flexDirection: "row", gap: 8, alignItems: "flex-start" }}>
        <View style={{ marginTop: 2 }}>
          <Mark kind={kind} size={14} silent />
        </View>
        <View style={{ flex: 1, minWidth: 0 }}>
          <Text variant="small" tone={fact.weight === null ? "ink2" : "ink"}>
            {sentence}{" "}
            {fileName
              ? t("facts.atIn", { line: fact.line, label: fact.label, name: fileName })
              : t("facts.at", { line: fact.line, label: fact.label })}
          </Text>
        </View>
      </View>
    </View>
  );
}

/** As many decimals as the value has, up to the tenth of a micrometre. */
function decimalsOf(value: number): number {
  return (String(Number(value.toFixed(4))).split(".")[1] ?? "").length;
}

/** Facts the record does not know yet, as the evidence form takes them; null where there are none. */
function takenOver(file: ImportFile, detail: ImportDetail): TakenOver | null {
  const open = file.facts.filter(({ verdict }) => verdict === "notRecorded");
  const numberOf = (kind: FileFact["kind"]) =>
    open.find((fact) => fact.kind === kind)?.value ?? undefined;
  const serialOf = (kind: FileFact["kind"]) => open.find((fact) => fact.kind === kind)?.cell;
  const startsAt = detail.checks?.files.find(({ fileId }) => fileId === file.id)?.firstInstant;
  const known: TakenOver = {
    boreMm: numberOf("boreMm"),
    outsideDiameterMm: numberOf("outsideDiameterMm"),
    wallMm: numberOf("wallMm"),
    soundSpeedMPerS: numberOf("soundSpeedMPerS"),
    serial: serialOf("serial"),
    meterSerial: serialOf("meterSerial"),
    loggerSerial: serialOf("loggerSerial"),
    supplyProbeSerial: serialOf("supplyProbeSerial"),
    returnProbeSerial: serialOf("returnProbeSerial"),
  };
  if (Object.values(known).every((value) => value === undefined)) return null;
  return { ...known, startsAt: startsAt ?? undefined };
}
