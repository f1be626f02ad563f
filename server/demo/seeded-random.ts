/** A small repeatable generator (mulberry32): the same seed gives the same demo on every machine. */
export function seededRandom(seed: number): () => number {
  let state = seed >>> 0;
  return () => {
    state = (state + 0x6d2b79f5) >>> 0;
    let mixed = Math.imul(state ^ (state >>> 15), state | 1);
    mixed ^= mixed + Math.imul(mixed ^ (mixed >>> 7), mixed | 61);
    return ((mixed ^ (mixed >>> 14)) >>> 0) / 4_294_967_296;
  };
}

/** Near-normal noise of standard deviation 1, from six uniform draws: cheap, and it has no far tail. */
export function noise(random: () => number): number {
  let sum = -3;
  for (let i = 0; i < 6; i++) sum += random();
  return sum * Math.SQRT2;
}
