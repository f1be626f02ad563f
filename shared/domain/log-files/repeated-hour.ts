/**
 * Tells apart the two passes of an hour that the clock showed twice.
 *
 * Each row in it may be either of two instants. Of all ways to choose, the one is taken whose steps
 * from row to row, in file order, come closest to the file's own step (a shortest path through two
 * candidates a row). So the second pass starts where the labels step back, an hourly file's two equal
 * labels become two hours, swapped or repeated rows end no pass, and newest-first files read as well.
 *
 * Example, step 30 min, 02:00, 02:30, 02:00, 02:30 in Paris on 26 October 2025 →
 * 00:00, 00:30, 01:00, 01:30 UTC.
 */
export interface PassChoice {
  /** The instant of each row. */
  readonly instantMs: readonly number[];
  /** A gap or a step back in the hour leaves more than one way open; the likeliest was taken. */
  readonly isUnclear: boolean;
}

/**
 * @param previousMs instant of the row before the first, NaN without one
 * @param earlierMs one candidate a row; rows outside the hour have it twice
 * @param stepMs the file's usual step, negative for newest first
 */
export function choosePasses(
  previousMs: number,
  earlierMs: readonly number[],
  laterMs: readonly number[],
  stepMs: number,
): PassChoice {
  const count = earlierMs.length;
  const cameFromLater: [Uint8Array, Uint8Array] = [new Uint8Array(count), new Uint8Array(count)];
  // The file has one change of pass, in its own direction; going back to the other is a last resort.
  const goingBack = Math.sqrt(Math.abs(stepMs));
  let costEarlier = stepCost(previousMs, earlierMs[0] as number, stepMs);
  let costLater = stepCost(previousMs, laterMs[0] as number, stepMs);
  for (let i = 1; i < count; i++) {
    const [fromEarlier, fromLater] = [earlierMs[i - 1] as number, laterMs[i - 1] as number];
    const [toEarlier, toLater] = [earlierMs[i] as number, laterMs[i] as number];
    // Rows outside the hour have one instant twice: no pass is entered or left there.
    const isPass = toEarlier !== toLater && fromEarlier !== fromLater;
    const toFirstPass = isPass && stepMs > 0 ? goingBack : 0;
    const toSecondPass = isPass && stepMs < 0 ? goingBack : 0;
    const ee = costEarlier + stepCost(fromEarlier, toEarlier, stepMs);
    const le = costLater + stepCost(fromLater, toEarlier, stepMs) + toFirstPass;
    const el = costEarlier + stepCost(fromEarlier, toLater, stepMs) + toSecondPass;
    const ll = costLater + stepCost(fromLater, toLater, stepMs);
    // A tie takes the earlier pass, as if the row before were the first of its hour.
    cameFromLater[0][i] = le < ee ? 1 : 0;
    cameFromLater[1][i] = ll < el ? 1 : 0;
    costEarlier = Math.min(ee, le);
    costLater = Math.min(el, ll);
  }
  const instantMs = new Array<number>(count);
  let isLater = costLater < costEarlier;
  for (let i = count - 1; i >= 0; i--) {
    instantMs[i] = (isLater ? laterMs[i] : earlierMs[i]) as number;
    isLater = cameFromLater[isLater ? 1 : 0][i] === 1;
  }
  return { instantMs, isUnclear: isUnclear(previousMs, instantMs, earlierMs, laterMs, stepMs) };
}

/** A step against the file's direction is a fault of its own, beside being of the wrong length. */
const BACKWARD_WEIGHT = 2;

/** By its root, so that one long gap costs less than two shorter ones that add up to it. */
function stepCost(fromMs: number, toMs: number, stepMs: number): number {
  if (Number.isNaN(fromMs)) return 0;
  const step = toMs - fromMs;
  const weight = step * stepMs < 0 ? BACKWARD_WEIGHT : 1;
  return weight * Math.sqrt(Math.abs(step - stepMs));
}

/**
 * True where a row of the hour lies further from its neighbour than half the repeated stretch: such a gap,
 * or such a step back, may hide the change of pass. Also where the file ends within the hour after one
 * pass and nothing but unbroken rows before it could tell which.
 */
function isUnclear(
  previousMs: number,
  chosen: readonly number[],
  earlierMs: readonly number[],
  laterMs: readonly number[],
  stepMs: number,
): boolean {
  let before = previousMs;
  let shift = 0;
  let hasGap = Number.isNaN(previousMs);
  let earlierRows = 0;
  let laterRows = 0;
  for (let i = 0; i < chosen.length; i++) {
    const at = chosen[i] as number;
    const shiftBefore = shift;
    shift = (laterMs[i] as number) - (earlierMs[i] as number);
    const away = Math.abs(at - before - stepMs);
    if (Math.max(shift, shiftBefore) > 0 && away >= Math.max(shift, shiftBefore) / 2) return true;
    if (away > Math.abs(stepMs) / 2) hasGap = true;
    if (shift > 0 && at === earlierMs[i]) earlierRows++;
    else if (shift > 0) laterRows++;
    before = at;
  }
  const endsInHour = shift > 0;
  return endsInHour && hasGap && (earlierRows === 0 || laterRows === 0);
}
