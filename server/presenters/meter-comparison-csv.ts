import type {
  ComparedSide,
  FigureAgreement,
  KnownFigure,
  MeterComparison,
  MeterComparisonResult,
} from "@shared/contracts/meter-comparisons";
import { FileAnswer } from "@server/http/file-answer";
import { csvFileName, csvRecord, numberCell, textCell } from "@server/queries/energy/csv-cells";

// A byte order mark: without it spreadsheets read ³, ± and Δ as another encoding.
const byteOrderMark = "\uFEFF";
const decimals = 6;

type Cell = string | number | null;
type Line = readonly [item: string, value: Cell, unit?: string, expanded?: Cell, note?: string];

/** A saved comparison as CSV, one figure a record: for a machine, in English, SI units and UTC. */
export function meterComparisonCsv(model: MeterComparison): FileAnswer {
  const name = csvFileName([
    model.siteName,
    "meters-compared",
    model.title,
    model.from.slice(0, 10),
  ]);
  const head = ["Section", "Item", "Value", "Unit", "Expanded uncertainty, k = 2", "Note"];
  return new FileAnswer({
    name,
    contentType: "text/csv; charset=utf-8",
    body: byteOrderMark + [head, ...records(model)].map(csvRecord).join(""),
  });
}

function cell(value: Cell): string {
  return typeof value === "string" ? textCell(value) : numberCell(value, decimals);
}

function section(name: string, lines: readonly Line[]): string[][] {
  return lines.map(([item, value, unit = "", expanded = "", note = ""]) =>
    [name, item, value, unit, expanded, note].map(cell),
  );
}

function records(model: MeterComparison): string[][] {
  const { result } = model;
  return [
    ...section("Comparison", [
      ["Title", model.title],
      ["Site", model.siteName],
      ["From (UTC)", model.from],
      ["To (UTC)", model.to],
      ["Hours", result.hours, "h"],
      ["Verdict", result.verdict, "", "", result.because.join(" ")],
      ["Errors cancel in energy", result.errorsCancel ? "yes" : "no"],
      ["State", model.state, "", "", model.withdrawnReason ?? ""],
      ["Saved (UTC)", model.recordedAt, "", "", model.recordedBy],
      ["Notes", model.notes ?? ""],
    ]),
    ...section("First meter", sideLines(result.first)),
    ...section("Second meter", sideLines(result.second)),
    ...section("Energy", agreementLines(result.energy, "kWh")),
    ...section("Volume", result.volume ? agreementLines(result.volume, "m³") : []),
    ...section("Mean ΔT", result.deltaT ? agreementLines(result.deltaT, "K") : []),
    ...bandRecords(result),
    ...standInRecords(model),
    ...section(
      "Cautions",
      result.cautions.map((code): Line => [code, "yes"]),
    ),
  ];
}

function sideLines(side: ComparedSide): Line[] {
  const figure = (item: string, known: KnownFigure | null, unit: string): Line[] =>
    known === null ? [] : [[item, known.value, unit, known.expanded]];
  const { limits, point } = side;
  return [
    ["Name", side.name, "", "", side.kind],
    ...figure("Energy", side.energyKwh, "kWh"),
    ...figure("Volume", side.volumeM3, "m³"),
    ...figure("Mean ΔT", side.deltaTK, "K"),
    ...(point
      ? ([
          ["Register", point.register],
          ["Covered share of time", point.coverage],
        ] satisfies Line[])
      : []),
    ...(limits
      ? ([
          ["Class", limits.meterClass],
          ["Limit of flow", limits.flowPercent, "%"],
          ["Limit of the sensor pair", limits.pairPercent, "%"],
          ["Limit of the calculator", limits.calculatorPercent, "%"],
          ["Limit of energy", limits.totalPercent, "%"],
          ["Expanded uncertainty from the class", limits.expandedPercent, "%"],
        ] satisfies Line[])
      : []),
  ];
}

function agreementLines(found: FigureAgreement, unit: string): Line[] {
  return [
    ["Difference, first − second", found.difference, unit],
    ["Difference, of second", found.differencePercent, "%"],
    ["Ratio, first ÷ second", found.ratio?.value ?? null, "", found.ratio?.expanded ?? null],
    ["E_n", found.en, "", "", found.code],
  ];
}

function bandRecords({ byFlow }: MeterComparisonResult): string[][] {
  return (byFlow?.bands ?? []).flatMap((band) => {
    const { fromM3PerHour: from, toM3PerHour: to } = band;
    const name = `Flow from ${cell(from)}${to === null ? "" : ` to ${cell(to)}`} m³/h`;
    return section(name, [
      ["Quarter-hours", band.quarterHours],
      ["First energy", band.first.value, "kWh", band.first.expanded],
      ["Second energy", band.second.value, "kWh", band.second.expanded],
      ...agreementLines(band.agreement, "kWh"),
    ]);
  });
}

const LABELS = {
  substitutedPortable: "substituted (portable)",
  estimatedDegreeHours: "estimated (degree-hour)",
  estimatedTime: "estimated (time)",
} as const;

function standInRecords({ input, result: { standIn } }: MeterComparison): string[][] {
  if (standIn === null) return [];
  return section("Stand-in", [
    ...standIn.parts.map((part): Line => [
      LABELS[part.code],
      part.energyKwh,
      "kWh",
      part.expandedKwh,
      `${cell(part.hours)} h`,
    ]),
    ["Total", standIn.totalKwh, "kWh", standIn.expandedKwh],
    ["Estimated share", standIn.estimatedPercent, "%"],
    ["Consent to bill substituted energy by", input.standIn?.consentBy ?? ""],
  ]);
}
