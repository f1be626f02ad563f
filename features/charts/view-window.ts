import { MINUTE_MS, type Interval } from "@shared/domain/time/interval";

/*
 * The part of a range that a chart shows, and how keys, wheel and fingers change it. All pure: the
 * view always lies inside the range and is never shorter than `leastMs`.
 */
export interface ViewBounds {
  readonly range: Interval;
  readonly leastMs: number;
}

/** A view shows at least ten rows, and never less than ten minutes of them. */
export function leastView(nominalStepS: number | null): number {
  return Math.max(10 * MINUTE_MS, (nominalStepS ?? 60) * 10_000);
}

const lengthOf = (view: Interval) => view.endMs - view.startMs;

/** The view pushed back into its bounds, its length kept where it fits. */
export function clampView(view: Interval, { range, leastMs }: ViewBounds): Interval {
  const most = lengthOf(range);
  const length = Math.min(most, Math.max(Math.min(leastMs, most), lengthOf(view)));
  const startMs = Math.min(Math.max(view.startMs, range.startMs), range.endMs - length);
  return { startMs, endMs: startMs + length };
}

/** `factor` over 1 shows more time, under 1 less; the instant `anchorMs` stays where it is. */
export function zoomView(
  view: Interval,
  factor: number,
  anchorMs: number,
  bounds: ViewBounds,
): Interval {
  const most = lengthOf(bounds.range);
  const least = Math.min(bounds.leastMs, most);
  const length = Math.min(most, Math.max(least, lengthOf(view) * factor));
  const share = (anchorMs - view.startMs) / lengthOf(view);
  const startMs = anchorMs - share * length;
  return clampView({ startMs, endMs: startMs + length }, bounds);
}

export function panView(view: Interval, byMs: number, bounds: ViewBounds): Interval {
  return clampView({ startMs: view.startMs + byMs, endMs: view.endMs + byMs }, bounds);
}

/** The view moved just so far that the instant is in it. */
export function revealInView(view: Interval, instantMs: number, bounds: ViewBounds): Interval {
  if (instantMs < view.startMs) return panView(view, instantMs - view.startMs, bounds);
  if (instantMs > view.endMs) return panView(view, instantMs - view.endMs, bounds);
  return view;
}

export function isWholeRange(view: Interval, range: Interval): boolean {
  return view.startMs <= range.startMs && view.endMs >= range.endMs;
}

/** Two fingers held at shares `a` and `b` of the width (0 to 1), whose instants must stay under them. */
export function pinchView(
  held: { readonly aMs: number; readonly bMs: number },
  a: number,
  b: number,
  bounds: ViewBounds,
): Interval | null {
  if (Math.abs(a - b) < 0.02 || held.aMs === held.bMs) return null;
  const length = (held.bMs - held.aMs) / (b - a);
  if (!(length > 0)) return null;
  const startMs = held.aMs - a * length;
  return clampView({ startMs, endMs: startMs + length }, bounds);
}
