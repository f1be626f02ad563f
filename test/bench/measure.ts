/** Seconds that one run took. */
export type Timed = () => Promise<number>;

export async function seconds(work: () => Promise<unknown> | unknown): Promise<number> {
  const started = performance.now();
  await work();
  return (performance.now() - started) / 1000;
}

export function median(values: readonly number[]): number {
  return quantile(values, 0.5);
}

/** The value below which the share `q` (0 to 1) of the values lies; straight between neighbours. */
export function quantile(values: readonly number[], q: number): number {
  const sorted = [...values].sort((a, b) => a - b);
  const place = q * (sorted.length - 1);
  const below = sorted[Math.floor(place)] ?? NaN;
  const above = sorted[Math.ceil(place)] ?? NaN;
  return below + (above - below) * (place - Math.floor(place));
}

/**
 * Runs all contenders in turn, `rounds` times, and answers each one's median; NaN for a contender
 * that is not there. A busy minute of the machine then falls on all of them, which is what makes
 * their ratios mean something.
 */
export async function interleaved<Name extends string>(
  rounds: number,
  contenders: Readonly<Record<Name, Timed | null>>,
): Promise<Record<Name, number>> {
  const present = Object.entries<Timed | null>(contenders).filter(isPresent);
  const took = new Map<string, number[]>(present.map(([name]) => [name, []]));
  for (let round = 1; round <= rounds; round++) {
    for (const [name, run] of present) {
      const time = await run();
      took.get(name)?.push(time);
      console.error(`  round ${round}  ${name}: ${time.toFixed(3)} s`);
    }
  }
  const names = Object.keys(contenders) as Name[];
  return Object.fromEntries(names.map((name) => [name, median(took.get(name) ?? [])])) as Record<
    Name,
    number
  >;
}

function isPresent(entry: [string, Timed | null]): entry is [string, Timed] {
  return entry[1] !== null;
}
