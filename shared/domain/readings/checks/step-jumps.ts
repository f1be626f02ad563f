/** Readings a jump is judged by on each side, and the middle one of them. */
export const SIDE = 5;
export const MIDDLE = 2;

/** How a series jumps at its rows, from medians of 5 and beyond what it drifts on both sides. */
export class Jumps {
  private readonly medians: Float64Array;

  constructor(
    private readonly instantMs: Float64Array,
    private readonly values: Float64Array,
  ) {
    this.medians = mediansOfFive(values);
  }

  at(row: number): number {
    const [before, after] = this.drifts(row, row);
    return this.plain(row) - ((before + after) / 2) * this.betweenMs(row);
  }

  /** Nearly every row leaves here, without a look at the drift. */
  isCalm(row: number, least: number): boolean {
    return Math.abs(this.medians[row]! - this.medians[row - SIDE]!) < least;
  }

  /** Mean distance of the 5 before a row and the 5 from it on from their medians. */
  scatterAt(row: number): number {
    let distance = 0;
    for (let i = row - SIDE; i < row + SIDE; i++)
      distance += Math.abs(this.values[i]! - this.medians[i < row ? row - SIDE : row]!);
    return distance / (2 * SIDE);
  }

  /** How much the drift changes at a row: a bend as large as the jump is no step. */
  bendAt(row: number): number {
    const [before, after] = this.drifts(row, row);
    return Math.abs(after - before) * this.betweenMs(row);
  }

  /** The row from `from` to `to` that best parts the rows round it into two levels, drift apart. */
  sharpest(from: number, to: number): number {
    const [before, after] = this.drifts(from, to);
    const startMs = this.instantMs[from]!;
    const level = new Float64Array(SIDE);
    let best = from;
    let bestDistance = Infinity;
    for (let at = from; at <= to; at++) {
      let distance = 0;
      for (const start of [at - SIDE, at]) {
        for (let i = 0; i < SIDE; i++) {
          const sinceMs = this.instantMs[start + i]! - startMs;
          level[i] = this.values[start + i]! - ((before + after) / 2) * sinceMs;
        }
        level.sort();
        distance += level[4]! + level[3]! - level[1]! - level[0]!;
      }
      if (distance < bestDistance) [best, bestDistance] = [at, distance];
    }
    return best;
  }

  private plain(row: number): number {
    return this.medians[row]! - this.medians[row - SIDE]!;
  }

  /** Between the middle reading of the 5 before a row and that of the 5 from it on. */
  private betweenMs(row: number): number {
    return this.instantMs[row + MIDDLE]! - this.instantMs[row - SIDE + MIDDLE]!;
  }

  /** Drift a millisecond before one row and from another on; at an end, that of the other side. */
  private drifts(before: number, after: number): readonly [number, number] {
    const hasBefore = before >= 2 * SIDE;
    const hasAfter = after + 2 * SIDE <= this.values.length;
    const one = hasBefore ? this.rate(before - SIDE) : null;
    const other = hasAfter ? this.rate(after + SIDE) : null;
    return [one ?? other ?? 0, other ?? one ?? 0];
  }

  private rate(row: number): number {
    return this.plain(row) / this.betweenMs(row);
  }
}

/** Median of each value and the four after it. */
function mediansOfFive(values: Float64Array): Float64Array {
  const medians = new Float64Array(Math.max(0, values.length - SIDE + 1));
  for (let i = 0; i < medians.length; i++)
    medians[i] = medianOfFive(
      values[i]!,
      values[i + 1]!,
      values[i + 2]!,
      values[i + 3]!,
      values[i + 4]!,
    );
  return medians;
}

/** By leaving out what cannot be the middle: the lower of two pairs' lows, the higher of their highs. */
function medianOfFive(a: number, b: number, c: number, d: number, e: number): number {
  const low = Math.max(Math.min(a, b), Math.min(c, d));
  const high = Math.min(Math.max(a, b), Math.max(c, d));
  return Math.max(Math.min(low, high), Math.min(Math.max(low, high), e));
}
