/** Where the two loops lie and how much room they leave, px. */
export interface PipesRoom {
  /** Middle of the heating pipe from the top and bottom edge, on wide screens. */
  readonly outer: number;
  /** Middle of the cooling pipe from the top and bottom edge, on wide screens. */
  readonly inner: number;
  readonly padding: {
    readonly paddingTop: number;
    readonly paddingBottom: number;
    readonly paddingLeft: number;
    readonly paddingRight: number;
  };
  /** The name stands this much above the middle of the form. */
  readonly brandLift: number;
}

/**
 * The room inside the loops for a window. Drawn for 1440 × 900 and 390 × 844; lower or narrower
 * windows draw the pipes nearer to the edge, so that the form needs no scrolling.
 */
export function pipesRoom(wide: boolean, screen: { width: number; height: number }): PipesRoom {
  if (!wide) {
    const side = screen.width < 360 ? 50 : 58;
    return {
      outer: 22,
      inner: 44,
      padding: {
        paddingTop: Math.round(84 * Math.min(1, Math.max(0.5, screen.height / 844))),
        paddingBottom: 76,
        paddingLeft: side,
        paddingRight: side,
      },
      brandLift: 0,
    };
  }
  const share = Math.min(1, Math.max(0.55, screen.height / 900));
  const outer = Math.round(96 * share);
  const inner = Math.round(168 * share);
  const narrow = screen.width < 1280;
  return {
    outer,
    inner,
    padding: {
      paddingTop: inner + 24,
      paddingBottom: inner + 24,
      paddingLeft: narrow ? 72 : 120,
      paddingRight: narrow ? 224 : 256,
    },
    brandLift: Math.round(150 * share),
  };
}
