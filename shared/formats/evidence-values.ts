import type { Quantity } from "../domain/units/display-units";
import type { Format } from "./format";
import { NO_BREAK_SPACE } from "./numbers";

type Values = Readonly<Record<string, string | number>>;

interface Writing {
  readonly ends: RegExp;
  readonly quantity?: Quantity;
  readonly places?: number;
  readonly unit?: string;
}

/** How a number of a verdict or a term is written, by the ending of its name; first match wins. */
const WRITINGS: readonly Writing[] = [
  { ends: /^(displayed|expected)MPerS$/, quantity: "velocity", places: 0 },
  { ends: /MPerS$/, quantity: "velocity", places: 3 },
  { ends: /^(flow|deviation)Percent$/, places: 2, unit: "%" },
  { ends: /Percent$|^percent$/, unit: "%" },
  { ends: /^(boreMm|enteredBoreMm)$/, quantity: "pipeSize", places: 2 },
  { ends: /Mm$/, quantity: "pipeSize", places: 3 },
  { ends: /PerK$/, places: 6, unit: "/K" },
  { ends: /K$/, quantity: "temperatureDifference", places: 3 },
  { ends: /C$/, quantity: "temperature", places: 1 },
  { ends: /LPerS$/, places: 3, unit: "L/s" },
  { ends: /S$/, places: 0, unit: "s" },
  { ends: /^(reynolds|least|most|days|pairs|wallReadings|advised|times)$/, places: 0 },
  { ends: /Bores$|^advised(Up|Down)stream$/, places: 3, unit: "D" },
];

/** Limits and factors are chosen, not measured: they are written with the decimals they have. */
const CHOSEN = /^(least|limit|most|advised|wallTolerance|outsideTolerance)|^(k|factor)$/;

function ownPlaces(value: number): number {
  return Math.min(3, (String(value).split(".")[1] ?? "").length);
}

function written(name: string, value: number, format: Format): string {
  const writing = WRITINGS.find(({ ends }) => ends.test(name));
  const quantity = writing?.quantity;
  const unit = writing?.unit;
  const places = CHOSEN.test(name) ? ownPlaces(value) : writing?.places;
  if (quantity !== undefined) return format.withUnit(value, quantity, places);
  const number = format.number(value, places);
  return unit === undefined ? number : `${number}${NO_BREAK_SPACE}${unit}`;
}

/**
 * The values of a verdict or of a term's origin as words of a sentence: numbers with their unit in
 * the reader's unit system, calendar days written out, codes through `say`. A sign stays: −4.34 %.
 */
export function evidenceValues(
  values: Values,
  format: Format,
  say: (key: string) => string,
): Record<string, string> {
  const shown: Record<string, string> = {};
  for (const [name, value] of Object.entries(values)) {
    if (typeof value === "number") shown[name] = written(name, value, format);
    else if (/On$/.test(name)) shown[name] = format.day(value, "dayMonthYear");
    else if (name === "fitting") shown[name] = say(`fitting.${value}`);
    else shown[name] = value;
  }
  return shown;
}
