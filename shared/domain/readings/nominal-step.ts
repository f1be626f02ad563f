/**
 * The step a logger was set to: the median of the steps between its rows, so that gaps and a few
 * seconds of jitter do not move it. Instants ascending, ms. Null with fewer than two rows.
 */
export function nominalStepMs(instantMs: Float64Array): number | null {
  const count = instantMs.length - 1;
  if (count < 1) return null;
  const steps = new Float64Array(count);
  let uniform = true;
  for (let i = 0; i < count; i++) {
    steps[i] = instantMs[i + 1]! - instantMs[i]!;
    if (steps[i] !== steps[0]) uniform = false;
  }
  return uniform ? steps[0]! : lowerMedian(steps);
}

/** The lower middle value, so that a step nobody logged is never made up; reorders `values`. */
function lowerMedian(values: Float64Array): number {
  const middle = (values.length - 1) >> 1;
  let low = 0;
  let high = values.length - 1;
  while (low < high) {
    const pivot = values[(low + high) >> 1]!;
    let i = low;
    let j = high;
    while (i <= j) {
      while (values[i]! < pivot) i++;
      while (values[j]! > pivot) j--;
      if (i <= j) {
        const held = values[i]!;
        values[i++] = values[j]!;
        values[j--] = held;
      }
    }
    if (middle <= j) high = j;
    else if (middle >= i) low = i;
    else break;
  }
  return values[middle]!;
}
