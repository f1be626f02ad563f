/**
 * Straight pipe before and after a clamp-on meter, counted in bores (D).
 *
 * Advice of common practice, without a published source: 10 D before and 5 D after the meter, and
 * twice as much before it where the flow arrives swirling or jetting: after two bends out of plane, a
 * throttled valve or a pump. Under half the advice is too short. Behind a single bend the published
 * effect is at most 2 % from 8 D and grows to 10.8 % nearer, reading low (Synowiec et al.). A verdict
 * warns; it never blocks.
 *
 * Example: 0.92 m before in a bore of 102.9651 mm → 8.935 D of 10, short; 0.61 m after → 5.924 D, ok.
 */
export type UpstreamFitting =
  | "bend"
  | "tee"
  | "reducer"
  | "openValve"
  | "twoBendsOutOfPlane"
  | "throttledValve"
  | "pump"
  | "other";

export type StraightRunVerdict = "ok" | "short" | "tooShort";

export interface StraightRun {
  readonly bores: number;
  readonly advisedBores: number;
  readonly verdict: StraightRunVerdict;
}

export const ADVISED_BORES = { before: 10, after: 5 } as const;

const DISTURBING: ReadonlySet<UpstreamFitting> = new Set([
  "twoBendsOutOfPlane",
  "throttledValve",
  "pump",
]);

/** A length in metres as bores; null where either is not a usable size. */
export function lengthInBores(lengthM: number, boreMm: number): number | null {
  return lengthM >= 0 && boreMm > 0 ? (lengthM * 1000) / boreMm : null;
}

/** Straight pipe before the meter; null where the length or the bore is not known. */
export function straightRunBefore(
  lengthM: number,
  boreMm: number,
  nearest: UpstreamFitting,
): StraightRun | null {
  const advised = ADVISED_BORES.before * (DISTURBING.has(nearest) ? 2 : 1);
  return judged(lengthM, boreMm, advised);
}

/** Straight pipe after the meter; null where the length or the bore is not known. */
export function straightRunAfter(lengthM: number, boreMm: number): StraightRun | null {
  return judged(lengthM, boreMm, ADVISED_BORES.after);
}

function judged(lengthM: number, boreMm: number, advisedBores: number): StraightRun | null {
  const bores = lengthInBores(lengthM, boreMm);
  if (bores === null) return null;
  const verdict = bores >= advisedBores ? "ok" : bores >= advisedBores / 2 ? "short" : "tooShort";
  return { bores, advisedBores, verdict };
}
