import type { Workings } from "../contracts/workings";
import {
  isoWeekOf,
  localDateOf,
  startOfLocalDay,
  addDays,
  weekdayOf,
} from "../domain/time/local-calendar";
import type { Quantity } from "../domain/units/display-units";
import type { Format } from "../formats/format";
import { formatFigure, NO_BREAK_SPACE } from "../formats/numbers";
import { budgetText, type BudgetText } from "./budget-text";
import { formulaLines, INPUT_SYMBOLS, type FormulaPart } from "./formula";
import { quantityOf } from "./shown-quantity";
import { significant, type Words } from "./words";

/**
 * The workings of a figure in words: one text that the panel shows and the PDF prints, so the two
 * can never say different things. Nothing here is worked out; values are only written.
 */
export interface WorkingsText {
  readonly title: string;
  /** "Cooling energy, CHW-1B, week 20. At 95 %, k = 2." */
  readonly subject: string;
  readonly figure: FigureText;
  readonly formula: readonly (readonly FormulaPart[])[];
  /** The formula as a sentence. */
  readonly formulaSaid: string;
  readonly byHand: { readonly label: string; readonly sum: string; readonly note: string } | null;
  readonly inputs: Section<InputText>;
  readonly budget: BudgetText | null;
  readonly rows: RowsText;
  readonly cautions: Section<{ readonly code: string; readonly text: string }>;
  readonly installations: Section<Line> & { readonly none: string | null };
  readonly corrections: Section<Line>;
  readonly fills: Section<Line> & { readonly note: string };
  readonly files: Section<Line & { readonly id: string; readonly hash: string }>;
  readonly basis: Section<{ readonly label: string; readonly value: string }>;
  readonly formulasFrom: Section<{ readonly name: string; readonly forWhat: string }>;
}

interface Section<Row> {
  readonly title: string;
  readonly rows: readonly Row[];
}

export interface Line {
  readonly key: string;
  readonly lead: string;
  readonly detail: string;
}

export interface FigureText {
  readonly value: string;
  readonly uncertainty: string | null;
  readonly unit: string;
}

export interface InputText {
  readonly key: string;
  readonly symbol: FormulaPart;
  readonly label: string;
  readonly detail: string;
  readonly value: string;
  readonly unit: string;
  /** Came off an instrument: set in the type of readings. */
  readonly asRead: boolean;
}

export interface RowsText {
  readonly title: string;
  readonly sentence: string;
  readonly covered: string | null;
}

/** `format` must be of the site's zone. */
export function workingsText(model: Workings, t: Words, format: Format): WorkingsText {
  return {
    title: t("title"),
    subject: subjectText(model, t, format),
    figure: figureText(model, format),
    formula: formulaLines(model),
    formulaSaid: t(`formula.said.${model.formula}`),
    byHand: byHandText(model, t, format),
    inputs: { title: t("inputs.title"), rows: inputTexts(model, t, format) },
    budget: budgetText(model, t, format),
    rows: rowsText(model, t, format),
    cautions: {
      title: t("caution.title"),
      rows: model.cautions.map((code) => ({
        code,
        text: t(`caution.${code}`, { pressure: pressureText(model, format) }),
      })),
    },
    installations: {
      title: t("evidence.title"),
      rows: model.installations.map((one) => installationLine(one, t, format)),
      none: model.installations.length === 0 ? t("evidence.none") : null,
    },
    corrections: {
      title: t("corrections.title"),
      rows: model.corrections.map((one) => ({
        key: one.id,
        lead: t(`corrections.kind.${one.change.kind}`),
        detail: t("corrections.by", {
          reason: sentence(one.reason),
          name: one.appliedBy ?? "",
          when: one.appliedAt === null ? "" : format.dateTime(Date.parse(one.appliedAt)),
        }),
      })),
    },
    fills: {
      title: t("fills.title"),
      note: t("fills.note"),
      rows: model.fills.map((one) => fillLine(one, model, t, format)),
    },
    files: {
      title: t("files.title"),
      rows: model.files.map(({ id, name, sha256, rows }) => ({
        key: id,
        id,
        lead: name,
        detail: rows === null ? "" : t("files.rows", { rows: format.number(rows, 0) }),
        hash: t("files.hash", { hash: sha256 }),
      })),
    },
    basis: { title: t("basis.title"), rows: basisRows(model, t, format) },
    formulasFrom: {
      title: t("formulasFrom.title"),
      rows: model.formulasFrom.map(({ name, edition, forWhat }) => ({
        name: edition === "" ? name : `${name}${edition}`,
        forWhat: t(`formulasFrom.for.${forWhat}`),
      })),
    },
  };
}

const sentence = (text: string) => (/[.!?]$/.test(text) ? text : `${text}.`);

function subjectText(model: Workings, t: Words, format: Format): string {
  const subject = t("subject", {
    figure: t(`figure.${model.figure}.${model.register}`),
    tag: model.subject.loopTag,
    range: rangeText(model, t, format),
  });
  return model.plusMinus === null ? subject : `${subject} ${t("coverage")}`;
}

/** Whole local days as days, an ISO week with its number, anything else to the minute. */
export function rangeText(model: Workings, t: Words, format: Format): string {
  const { zone } = model.subject;
  const fromMs = Date.parse(model.from);
  const toMs = Date.parse(model.to);
  const first = localDateOf(fromMs, zone);
  const end = localDateOf(toMs, zone);
  const last = addDays(end, -1);
  const whole = startOfLocalDay(first, zone) === fromMs && startOfLocalDay(end, zone) === toMs;
  if (!whole) {
    const sameDay = first === localDateOf(toMs, zone);
    return t("range.from", {
      from: format.dateTime(fromMs),
      to: sameDay ? format.time(toMs) : format.dateTime(toMs),
    });
  }
  if (first === last) return format.day(first, "dayMonthYear");
  const days = { from: format.day(first, "dayMonth"), to: format.day(last, "dayMonthYear") };
  const isWeek = weekdayOf(first) === 1 && addDays(first, 7) === end;
  return isWeek ? t("range.week", { week: isoWeekOf(first).week, ...days }) : t("range.days", days);
}

/** The figure and its ± in the shown unit, both stopping at the same place. */
export function figureText(model: Workings, format: Format): FigureText {
  const quantity = quantityOf(model);
  const shown = (stored: number) => (quantity ? format.toDisplay(stored, quantity) : stored);
  const value = model.value === null ? null : shown(model.value);
  const expanded = model.plusMinus?.expanded ?? null;
  const uncertainty =
    expanded === null || quantity === null ? expanded : expanded * format.unit(quantity).factor;
  const places = model.figure === "completeness" ? 1 : model.figure === "deltaT" ? 2 : undefined;
  const text = formatFigure(value, uncertainty, format.language, places);
  return { ...text, unit: quantity ? format.unit(quantity).unit : model.unit };
}

function byHandText(model: Workings, t: Words, format: Format): WorkingsText["byHand"] {
  const { byHand } = model;
  if (byHand === null) return null;
  const write = (value: number, unit: string) =>
    unit === ""
      ? significant(value, format)
      : `${significant(value, format)}${NO_BREAK_SPACE}${unit}`;
  const factors = byHand.factors.map(({ value, unit }) => write(value, unit)).join(" × ");
  const sum = t("byHand.sum", { factors, result: write(byHand.result, byHand.unit) });
  const quantity = quantityOf(model);
  const other = quantity !== null && format.unit(quantity).unit !== byHand.unit;
  const difference = byHand.differencePercent;
  const size = difference === null ? null : Math.abs(difference);
  return {
    label: t("byHand.label"),
    sum: other
      ? `${sum} ${t("byHand.also", { result: format.withUnit(byHand.result, quantity) })}`
      : sum,
    note:
      size === null
        ? ""
        : size < 0.005
          ? t("byHand.same")
          : t("byHand.difference", { percent: format.number(size, size < 0.1 ? 2 : 1) }),
  };
}

const inputQuantity: Partial<Record<Workings["inputs"][number]["symbol"], Quantity>> = {
  flow: "flow",
  supply: "temperature",
  return: "temperature",
  deltaT: "temperatureDifference",
  pressure: "pressure",
  bore: "pipeSize",
};

const twoPlaces: readonly string[] = ["flow", "supply", "return", "deltaT"];

function inputTexts(model: Workings, t: Words, format: Format): InputText[] {
  return model.inputs.map((input) => {
    const quantity = inputQuantity[input.symbol];
    const places = twoPlaces.includes(input.symbol) ? 2 : undefined;
    const write = (value: number) =>
      quantity
        ? format.number(format.toDisplay(value, quantity), places)
        : significant(value, format);
    const detail = t(`inputs.detail.${input.code}`, { pressure: pressureText(model, format) });
    const serial = input.source.instrument;
    return {
      key: input.code,
      symbol: INPUT_SYMBOLS[input.symbol],
      label: t(`inputs.symbol.${input.symbol}`),
      detail: serial === null ? detail : t("inputs.withSerial", { serial, detail }),
      value:
        input.range !== null
          ? t("inputs.between", { from: write(input.range[0]), to: write(input.range[1]) })
          : input.value === null
            ? "—"
            : write(input.value),
      unit: quantity ? format.unit(quantity).unit : input.unit,
      asRead: input.source.code === "read",
    };
  });
}

function pressureText({ basis }: Workings, format: Format): string {
  return format.withUnit(basis.absoluteMPa, "pressure", 2);
}

function rowsText({ rows, coverage }: Workings, t: Words, format: Format): RowsText {
  const kinds = ["measured", "filled", "excluded", "noReading", "missing"] as const;
  return {
    title: t("rows.title"),
    sentence: kinds
      .filter((kind) => kind === "measured" || (rows[kind] ?? 0) > 0)
      .map((kind) => t(`rows.${kind}`, { rows: format.number(rows[kind] ?? 0, 0) }))
      .join(", "),
    covered:
      coverage === null
        ? null
        : t("rows.covered", { percent: format.number(coverage * 100, coverage < 0.9995 ? 1 : 0) }),
  };
}

function installationLine(one: Workings["installations"][number], t: Words, format: Format): Line {
  const from = format.date(Date.parse(one.startsAt), "dayMonthYear");
  const looks = one.verdicts.filter(({ weight }) => weight !== "fine").length;
  const probes = one.supplyProbeSerial !== null && one.returnProbeSerial !== null;
  const parts = [
    t("evidence.version", { version: one.version }),
    t("evidence.by", { name: one.recordedBy }),
    ...(one.flowMeterSerial === null ? [] : [t("evidence.meter", { serial: one.flowMeterSerial })]),
    ...(probes
      ? [
          t("evidence.probes", { supply: one.supplyProbeSerial, return: one.returnProbeSerial }),
          t(one.bathCheckId === null ? "evidence.unchecked" : "evidence.checked"),
        ]
      : []),
    t("evidence.share", {
      percent: format.number(one.share * 100, one.share > 0.9995 || one.share === 0 ? 0 : 1),
    }),
    ...(looks === 0 ? [] : [t("evidence.look", { count: looks })]),
  ];
  return {
    key: one.id,
    lead:
      one.endsAt === null
        ? t("evidence.one", { from })
        : t("evidence.span", { from, to: format.date(Date.parse(one.endsAt), "dayMonthYear") }),
    detail: parts.join(", "),
  };
}

function fillLine(
  one: Workings["fills"][number],
  { register }: Workings,
  t: Words,
  format: Format,
): Line {
  const heating = register === "heating";
  return {
    key: one.id,
    lead: `${t(`fills.method.${one.method}`)}, ${t("range.from", {
      from: format.dateTime(Date.parse(one.from)),
      to: format.dateTime(Date.parse(one.to)),
    })}`,
    detail: t("fills.line", {
      energy: format.withUnit(
        heating ? one.heatingKwh : one.coolingKwh,
        heating ? "heatingEnergy" : "coolingEnergy",
      ),
      percent: significant(one.uncertaintyPercent, format, 2),
      state: t(`fills.state.${one.state}`),
    }),
  };
}

/** Cut-offs and what they held back; on a changeover loop they are the band between its registers. */
function cutOffRows(
  { basis, figure }: Workings,
  t: Words,
  format: Format,
): readonly { readonly label: string; readonly value: string }[] {
  const { flowM3PerHour, deltaTK, suppressedKwh, suppressedS, separatesRegisters } = basis.cutOffs;
  if (figure === "volume" || figure === "completeness") return [];
  if (flowM3PerHour === null && deltaTK === null && !separatesRegisters) return [];
  const limits = [
    ...(flowM3PerHour === null ? [] : [format.withUnit(flowM3PerHour, "flow")]),
    ...(deltaTK === null ? [] : [format.withUnit(deltaTK, "temperatureDifference")]),
  ];
  return [
    {
      label: t(separatesRegisters ? "basis.band" : "basis.cutOffs"),
      value:
        limits.length === 0
          ? t("basis.noBand")
          : t("basis.under", { limits: limits.join(t("basis.or")) }),
    },
    ...(suppressedS === 0
      ? []
      : [
          {
            label: t("basis.heldBack"),
            value: t("basis.heldBackSize", {
              energy: format.withUnit(suppressedKwh, "heatingEnergy"),
              time: format.duration(suppressedS),
            }),
          },
        ]),
  ];
}

function basisRows(
  model: Workings,
  t: Words,
  format: Format,
): readonly { readonly label: string; readonly value: string }[] {
  const { basis, meterSide } = model;
  const { fluid } = basis;
  const unknown = t("basis.unknown");
  const fluidText =
    fluid.kind === "water"
      ? t("basis.fluidKind.water")
      : t(`basis.fluidKind.${fluid.kind}`, {
          percent: format.number(fluid.percent, 1),
          basis: t(`basis.fluidBasis.${fluid.basis}`),
        });
  const pressure = pressureText(model, format);
  return [
    { label: t("basis.fluid"), value: fluidText },
    {
      label: t("basis.pressure"),
      value: t(basis.pressureAssumed ? "basis.pressureAssumed" : "basis.pressureGiven", {
        pressure,
      }),
    },
    { label: t("basis.meter"), value: t(`basis.meterSide.${meterSide}`) },
    ...cutOffRows(model, t, format),
    {
      label: t("basis.engine"),
      value:
        basis.engineVersion === null
          ? unknown
          : t("basis.engineVersion", { version: basis.engineVersion }),
    },
    {
      label: t("basis.revision"),
      value:
        basis.calculatedAt === null
          ? String(basis.revision)
          : t("basis.revisionAt", {
              revision: basis.revision,
              when: format.dateTime(Date.parse(basis.calculatedAt)),
            }),
    },
    ...(basis.pointVersion === null
      ? []
      : [{ label: t("basis.pointVersion"), value: basis.pointVersion }]),
  ];
}
