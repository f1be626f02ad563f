/** Spacing, radii, strokes and times in px and ms. Spacing is on a 4-px grid. */
export const space = {
  0: 0,
  1: 4,
  2: 8,
  3: 12,
  4: 16,
  5: 20,
  6: 24,
  8: 32,
  10: 40,
  14: 56,
  18: 72,
} as const;

/** Named after bend radii. `pipe` is for loop cards only. */
export const radius = {
  hair: 2,
  small: 6,
  field: 8,
  button: 10,
  card: 14,
  pipe: 28,
  sheet: 22,
} as const;

export const stroke = {
  hair: 1,
  control: 1.5,
  run: 2.5,
  chart: 2,
  chartFocus: 2.75,
  focus: 3,
} as const;

/** Pipe stroke by nominal size in mm: a bigger pipe looks bigger, not to scale. */
export const pipeStrokeByNominalSize: readonly (readonly [nominalMm: number, px: number])[] = [
  [50, 5],
  [65, 6],
  [80, 7],
  [100, 9],
  [150, 12],
  [200, 14],
];

export const motion = {
  quick: 120,
  settle: 220,
  flow: 420,
  easing: "cubic-bezier(.2,.7,.2,1)",
  easingExit: "cubic-bezier(.4,0,1,1)",
} as const;

export const breakpoint = { tablet: 720, wide: 1120, max: 1680 } as const;

export const layout = {
  phone: { gutter: 12, margin: 16, bottomBar: 72 },
  tablet: { gutter: 16, margin: 24, rail: 84 },
  wide: { gutter: 20, margin: 28, rail: 172, inspector: 372, workings: 420 },
} as const;

/** Smallest sides of things a finger or a glove must hit. */
export const target = { default: 48, field: 56, fieldKey: 68, dense: 40 } as const;
