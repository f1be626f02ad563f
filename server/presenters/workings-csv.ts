import type { Workings } from "@shared/contracts/workings";
import { localDateOf } from "@shared/domain/time/local-calendar";
import { makeFormat } from "@shared/formats/format";
import { workingsText } from "@shared/workings/workings-text";
import { FileAnswer } from "@server/http/file-answer";
import { csvFileName, csvRecord, numberCell, textCell } from "@server/queries/energy/csv-cells";
import { workingsWords } from "@server/words/workings-words";

// A byte order mark: without it spreadsheets read °, ³ and ± as another encoding.
const byteOrderMark = "\uFEFF";

/** More than any meter resolves: who reads this rounds by the ± beside it. */
const decimals = 6;

/**
 * The workings as CSV, one thing a record: for a machine, so in English, SI units and UTC whoever asks.
 * Labels are those of the screen.
 */
export function workingsCsv(model: Workings): FileAnswer {
  const { subject } = model;
  const name = csvFileName([
    subject.loopTag,
    subject.pointCode,
    "workings",
    model.figure,
    localDateOf(Date.parse(model.from), subject.zone),
  ]);
  return new FileAnswer({
    name,
    contentType: "text/csv; charset=utf-8",
    body: byteOrderMark + records(model).map(csvRecord).join(""),
  });
}

type Cell = string | number | null;

function cells(values: readonly Cell[]): string[] {
  return values.map((value) =>
    typeof value === "string" ? textCell(value) : numberCell(value, decimals),
  );
}

function records(model: Workings): string[][] {
  const text = workingsText(model, workingsWords("en"), makeFormat("en", "si", model.subject.zone));
  const { subject, plusMinus, budget, rows, basis } = model;
  const section = (name: string, lines: readonly (readonly Cell[])[]) =>
    lines.map((line) => cells([name, ...line, ...Array<Cell>(4 - line.length).fill("")]));
  return [
    ["Section", "Item", "Value", "Unit", "Detail"],
    ...section("Figure", [
      ["Site", subject.siteName],
      ["Loop", subject.loopTag, "", subject.loopName],
      ["Point", subject.pointCode],
      ["From (UTC)", model.from],
      ["To (UTC)", model.to],
      [model.figure, model.value, model.unit, text.formulaSaid],
      ["Expanded uncertainty, k = 2", plusMinus?.expanded ?? null, model.unit],
      ["Expanded uncertainty, k = 2", plusMinus?.percent ?? null, "%", plusMinus?.basis ?? ""],
    ]),
    ...section(text.byHand?.label ?? "By hand", byHandLines(model)),
    ...section(
      text.inputs.title,
      model.inputs.flatMap((input, at) => {
        const shown = text.inputs.rows[at];
        const label = shown?.label ?? input.symbol;
        const detail = shown?.detail ?? "";
        return input.range === null
          ? [[label, input.value, input.unit, detail]]
          : [
              [`${label}, least`, input.range[0], input.unit, detail],
              [`${label}, greatest`, input.range[1], input.unit, detail],
            ];
      }),
    ),
    ...section(
      text.budget?.title ?? "Budget",
      (budget?.terms ?? []).map(({ percent, term }, at) => [
        text.budget?.rows[at]?.label ?? term.kind,
        percent,
        "%",
        `${text.budget?.rows[at]?.detail ?? ""}; ${term.nature}`,
      ]),
    ),
    ...section(text.budget?.title ?? "Budget", [
      ["Systematic, standard", budget?.systematicPercent ?? null, "%"],
      ["Random, standard", budget?.randomPercent ?? null, "%"],
      ["Combined, standard", budget?.combinedPercent ?? null, "%"],
      ["Coverage factor", budget?.k ?? null, ""],
      ["Effective samples", budget?.effectiveSamples ?? null, ""],
    ]),
    ...section(text.rows.title, [
      ["Measured", rows.measured, "rows"],
      ["Filled", rows.filled, "rows"],
      ["Excluded", rows.excluded, "rows"],
      ["Without reading", rows.noReading, "rows"],
      ["Missing", rows.missing, "rows"],
      ["Due", rows.expected, "rows"],
      ["Covered share of time", model.coverage, ""],
    ]),
    ...section(
      text.installations.title,
      text.installations.rows.map(({ key, lead, detail }) => [lead, key, "", detail]),
    ),
    ...section(
      text.corrections.title,
      text.corrections.rows.map(({ key, lead, detail }) => [lead, key, "", detail]),
    ),
    ...section(
      text.fills.title,
      model.fills.map((fill, at) => [
        text.fills.rows[at]?.lead ?? fill.method,
        model.register === "heating" ? fill.heatingKwh : fill.coolingKwh,
        "kWh",
        text.fills.rows[at]?.detail ?? "",
      ]),
    ),
    ...section(
      text.files.title,
      model.files.map((file) => [file.name, file.rows, "rows", `SHA-256 ${file.sha256}`]),
    ),
    ...section(text.basis.title, [
      ...text.basis.rows.map(({ label, value }) => [label, value]),
      ["Absolute pressure", basis.absoluteMPa, "MPa"],
    ]),
    ...section(
      text.formulasFrom.title,
      text.formulasFrom.rows.map(({ name, forWhat }) => [name, "", "", forWhat]),
    ),
    ...section(
      text.cautions.title,
      text.cautions.rows.map(({ code, text: words }) => [code, "", "", words]),
    ),
  ];
}

function byHandLines({ byHand }: Workings): Cell[][] {
  if (byHand === null) return [];
  return [
    ...byHand.factors.map(({ code, value, unit }) => [code, value, unit]),
    ["result", byHand.result, byHand.unit],
    ["difference from the sum of rows", byHand.differencePercent, "%"],
  ];
}
