/** Where a member of the line stands, px from the start of the line. */
export interface Span {
  readonly start: number;
  readonly end: number;
}

/** Radius of the bends of the line. */
export const BEND = 10;

/**
 * The line along the foot of a row (tabs, steps), rising over the current member.
 * Open at the bottom: the current member opens into what follows.
 *
 * @returns `before` runs from 0 through the current member; `after` is the straight rest, so that
 *          steps can dash it (dashed is still to come).
 */
export function risingRun(
  span: Span,
  width: number,
  height: number,
): { readonly before: string; readonly after: string; readonly whole: string } {
  const foot = height - 1.25;
  const top = 2;
  const r = BEND;
  const left = Math.max(r + 2, span.start);
  const right = Math.min(width - r - 2, Math.max(span.end, left + 2 * r));
  const start = Math.max(0, left - r);
  const before =
    `M0 ${foot}H${start}a${r} ${r} 0 0 0 ${r} ${-r}V${top + r}a${r} ${r} 0 0 1 ${r} ${-r}` +
    `H${right - r}a${r} ${r} 0 0 1 ${r} ${r}V${foot - r}a${r} ${r} 0 0 0 ${r} ${r}`;
  return {
    before,
    after: `M${Math.min(width, right + r)} ${foot}H${width}`,
    whole: `${before}H${width}`,
  };
}

/** The line down the right edge of a rail, bending out to the left round the current item. */
export function railRun(span: Span | null, width: number, height: number): string {
  const x = width - 1.25;
  const r = 13;
  const out = 9;
  if (!span) return `M${x} -4V${height + 4}`;
  return (
    `M${x} -4V${span.start - r}a${r} ${r} 0 0 1 ${-r} ${r}H${out + r}a${r} ${r} 0 0 0 ${-r} ${r}` +
    `V${span.end - r}a${r} ${r} 0 0 0 ${r} ${r}H${x - r}a${r} ${r} 0 0 1 ${r} ${r}V${height + 4}`
  );
}

/** The line along the top of the phone bar, dipping under the current item. */
export function barRun(span: Span | null, width: number): string {
  const y = 1.25;
  const r = 12;
  const depth = 64;
  if (!span) return `M-4 ${y}H${width + 4}`;
  const left = span.start + 4;
  const right = span.end - 4;
  return (
    `M-4 ${y}H${left - r}a${r} ${r} 0 0 1 ${r} ${r}V${depth - r}a${r} ${r} 0 0 0 ${r} ${r}` +
    `H${right - r}a${r} ${r} 0 0 0 ${r} ${-r}V${y + r}a${r} ${r} 0 0 1 ${r} ${-r}H${width + 4}`
  );
}
