/** A Float64Array that grows; doubling keeps the cost per row flat. */
export class GrowingColumn {
  private values: Float64Array;
  length = 0;

  constructor(capacity: number) {
    this.values = new Float64Array(Math.max(16, capacity));
  }

  push(value: number): void {
    if (this.length === this.values.length) this.grow();
    this.values[this.length++] = value;
  }

  private grow(): void {
    const next = new Float64Array(Math.ceil(this.values.length * 1.6));
    next.set(this.values);
    this.values = next;
  }

  /** The values written so far; a view, not a copy. */
  view(): Float64Array {
    return this.values.subarray(0, this.length);
  }
}
