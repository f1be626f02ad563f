/** What fingers, wheel and keys ask of a chart; places are shares of the plot's width, 0 to 1. */
export interface ChartGestures {
  /** Px from the surface's left edge to the plot's, and the plot's width. */
  readonly plotLeft: number;
  readonly plotWidth: number;
  /** Whether a drag moves the view (something lies outside it) or only the cursor. */
  readonly canPan: boolean;
  readonly onPoint: (share: number) => void;
  readonly onLeave: () => void;
  readonly onPan: (shareMoved: number) => void;
  readonly onZoom: (factor: number, share: number) => void;
  readonly onPinch: (phase: "start" | "move", a: number, b: number) => void;
  /** True where the key was of use, so that the page does not scroll as well. */
  readonly onKey: (key: string, shift: boolean) => boolean;
  readonly onFocusChange: (focused: boolean) => void;
}

/** A wheel's notch as a zoom factor; the same however a browser counts (px, lines or pages). */
export function wheelFactor(deltaY: number, deltaMode: number): number {
  const px = deltaY * (deltaMode === 1 ? 16 : deltaMode === 2 ? 400 : 1);
  return Math.exp(Math.max(-240, Math.min(240, px)) * 0.0022);
}

export function shareOf(x: number, { plotLeft, plotWidth }: ChartGestures): number {
  return Math.min(1, Math.max(0, (x - plotLeft) / Math.max(1, plotWidth)));
}
