import type { Workings } from "../contracts/workings";

/** A piece of a formula: a symbol in italics or an upright sign, with what hangs below it. */
export interface FormulaPart {
  readonly text: string;
  readonly italic: boolean;
  readonly below?: string;
}

const symbol = (text: string, below?: string): FormulaPart => ({
  text,
  italic: true,
  ...(below === undefined ? {} : { below }),
});
const sign = (text: string): FormulaPart => ({ text, italic: false });

/** V with a dot: flow. The dot is a combining mark, which STIX Two Text places. */
const FLOW = "V\u0307";

/** Symbols of what goes in, by the contract's names. */
export const INPUT_SYMBOLS: Readonly<Record<Workings["inputs"][number]["symbol"], FormulaPart>> = {
  flow: symbol(FLOW),
  supply: symbol("θ", "s"),
  return: symbol("θ", "r"),
  deltaT: symbol("Δθ"),
  density: symbol("ρ"),
  enthalpy: symbol("h"),
  power: symbol("P"),
  pressure: symbol("p"),
  bore: symbol("d"),
};

/** h of the warmer side less h of the cooler one, so that both registers count upwards. */
function enthalpyDifference(register: Workings["register"]): FormulaPart[] {
  const [first, second] = register === "heating" ? ["s", "r"] : ["r", "s"];
  return [
    sign("["),
    symbol("h"),
    sign("("),
    symbol("θ", first),
    sign(") − "),
    symbol("h"),
    sign("("),
    symbol("θ", second),
    sign(")]"),
  ];
}

function density(meterSide: Workings["meterSide"]): FormulaPart[] {
  return [symbol("ρ"), sign("("), symbol("θ", meterSide === "supply" ? "s" : "r"), sign(")")];
}

const STEP: readonly FormulaPart[] = [sign(" Δ"), symbol("t")];

/** The formula a figure was worked out with, a line of parts each. */
export function formulaLines({
  formula,
  register,
  meterSide,
}: Pick<Workings, "formula" | "register" | "meterSide">): readonly (readonly FormulaPart[])[] {
  const power = [
    symbol(FLOW, "i"),
    sign(" "),
    ...density(meterSide),
    sign(" "),
    ...enthalpyDifference(register),
  ];
  switch (formula) {
    case "sumOfSteps":
      return [[symbol("E"), sign(" = Σ "), ...power, ...STEP]];
    case "trapezoid":
      return [
        [
          symbol("E"),
          sign(" = Σ ½ ("),
          symbol("P", "i"),
          sign(" + "),
          symbol("P", "i+1"),
          sign(")"),
          ...STEP,
        ],
        [symbol("P", "i"), sign(" = "), ...power],
      ];
    case "heatCoefficient":
      return [
        [symbol("E"), sign(" = Σ "), symbol("V"), sign(" "), symbol("k"), sign(" Δ"), symbol("θ")],
      ];
    case "sumOfPower":
      return [[symbol("E"), sign(" = Σ "), symbol("P", "i"), ...STEP]];
    case "counterDifference":
      return [[symbol("E"), sign(" = "), symbol("C", "end"), sign(" − "), symbol("C", "start")]];
    case "sumOfFlow":
      return [[symbol("V"), sign(" = Σ "), symbol(FLOW, "i"), ...STEP]];
    case "flowWeightedDeltaT":
      return [
        [
          sign("Δ"),
          symbol("θ"),
          sign(" = Σ "),
          symbol(FLOW, "i"),
          sign(" Δ"),
          symbol("θ", "i"),
          sign(" / Σ "),
          symbol(FLOW, "i"),
        ],
      ];
    case "meanOverWindow":
      return [[symbol("P"), sign(" = "), symbol("E"), sign(" / "), symbol("t")]];
    case "coveredShare":
      return [[symbol("n", "measured"), sign(" / "), symbol("n", "due")]];
  }
}
