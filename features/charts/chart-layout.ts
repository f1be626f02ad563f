/** Where the parts of the loop chart lie, in px from the frame's top left. */
export interface ChartLayout {
  readonly width: number;
  readonly height: number;
  readonly left: number;
  readonly right: number;
  readonly temperature: { readonly top: number; readonly bottom: number };
  readonly flow: { readonly top: number; readonly bottom: number };
  readonly quality: { readonly top: number; readonly bottom: number };
  /** Baseline of the days' names. */
  readonly dayBaseline: number;
  /** Baselines of the energy under each column; empty on a phone, where the days have a list. */
  readonly energyBaselines: readonly number[];
  readonly ruleY: number | null;
  /** Names of the curves at the right end. */
  readonly named: boolean;
  readonly cursorTop: number;
  /** Narrowest column that is worth drawing, px. */
  readonly leastColumn: number;
}

/** Under this width the chart drops the names at its right and the energy under the days. */
const NARROW = 560;

/** @param registers how many energies stand under each column: 2 on a changeover loop, 0 for none. */
export function chartLayout(width: number, registers: 0 | 1 | 2): ChartLayout {
  if (width < NARROW) {
    return {
      width,
      height: 270,
      left: 30,
      right: Math.max(31, width - 6),
      // Room above for what the cursor reads: it must not hide a peak.
      temperature: { top: 30, bottom: 167 },
      flow: { top: 183, bottom: 226 },
      quality: { top: 236, bottom: 242 },
      dayBaseline: 264,
      energyBaselines: [],
      ruleY: null,
      named: false,
      cursorTop: 22,
      leastColumn: 3.5,
    };
  }
  const energyBaselines = [396, 418].slice(0, registers);
  return {
    width,
    height: (energyBaselines.at(-1) ?? 370) + 8,
    left: 38,
    // Two energies need their registers' names beside them.
    right: width - (registers === 2 ? 84 : 64),
    temperature: { top: 34, bottom: 245 },
    flow: { top: 265, bottom: 327 },
    quality: { top: 337, bottom: 344 },
    dayBaseline: 366,
    energyBaselines,
    ruleY: registers === 0 ? null : 375,
    named: true,
    cursorTop: 26,
    leastColumn: 2,
  };
}

/** The same with one panel from top to bottom, where there is power and nothing else to draw. */
export function powerLayout(layout: ChartLayout): ChartLayout {
  const { bottom } = layout.flow;
  return {
    ...layout,
    temperature: { top: layout.temperature.top, bottom },
    flow: { top: bottom, bottom },
  };
}

export function plotWidth({ left, right }: ChartLayout): number {
  return right - left;
}
