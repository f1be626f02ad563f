/**
 * Writes and reads columns of numbers as bytes: variable-length integers (seven bits a byte, least
 * significant first) and IEEE doubles. Integers lie within 0…2^53.
 */
export class ByteWriter {
  private bytes: Uint8Array;
  private length = 0;

  constructor(capacity: number) {
    this.bytes = new Uint8Array(Math.max(64, capacity));
  }

  byte(value: number): void {
    this.reserve(1);
    this.bytes[this.length++] = value;
  }

  raw(values: Uint8Array): void {
    this.reserve(values.length);
    this.bytes.set(values, this.length);
    this.length += values.length;
  }

  integer(value: number): void {
    this.reserve(8);
    let rest = value;
    // Beyond 31 bits the bit operators wrap, so the high part goes by division.
    while (rest >= 0x80000000) {
      this.bytes[this.length++] = (rest % 128) | 0x80;
      rest = Math.floor(rest / 128);
    }
    while (rest > 127) {
      this.bytes[this.length++] = (rest & 127) | 0x80;
      rest >>>= 7;
    }
    this.bytes[this.length++] = rest;
  }

  /** Signed: 0, −1, 1, −2, 2 … become 0, 1, 2, 3, 4 … */
  signed(value: number): void {
    this.integer(value < 0 ? -2 * value - 1 : 2 * value);
  }

  /** Many integers at once, each below 2^32. */
  integers(values: Uint32Array): void {
    this.reserve(values.length * 5);
    const { bytes } = this;
    let at = this.length;
    for (let i = 0; i < values.length; i++) {
      let rest = values[i] as number;
      while (rest > 127) {
        bytes[at++] = (rest & 127) | 0x80;
        rest >>>= 7;
      }
      bytes[at++] = rest;
    }
    this.length = at;
  }

  doubles(values: Float64Array): void {
    this.reserve(values.length * 8);
    const view = new DataView(this.bytes.buffer);
    for (let i = 0; i < values.length; i++) {
      view.setFloat64(this.length, values[i] as number, true);
      this.length += 8;
    }
  }

  finish(): Uint8Array {
    return this.bytes.subarray(0, this.length);
  }

  private reserve(more: number): void {
    if (this.length + more <= this.bytes.length) return;
    const grown = new Uint8Array(Math.max(this.bytes.length * 2, this.length + more));
    grown.set(this.bytes.subarray(0, this.length));
    this.bytes = grown;
  }
}

/** Reads what {@link ByteWriter} wrote. @throws RangeError where the bytes end too soon. */
export class ByteReader {
  private at = 0;

  constructor(private readonly bytes: Uint8Array) {}

  byte(): number {
    const value = this.bytes[this.at];
    if (value === undefined) throw new RangeError("a reading block ends too soon");
    this.at++;
    return value;
  }

  raw(length: number): Uint8Array {
    if (this.at + length > this.bytes.length) throw new RangeError("a reading block ends too soon");
    this.at += length;
    return this.bytes.slice(this.at - length, this.at);
  }

  integer(): number {
    const { bytes } = this;
    let byte = this.byte();
    let value = byte & 127;
    let scale = 128;
    while (byte > 127) {
      if (this.at >= bytes.length) throw new RangeError("a reading block ends too soon");
      byte = bytes[this.at++] as number;
      value += (byte & 127) * scale;
      scale *= 128;
    }
    return value;
  }

  signed(): number {
    const value = this.integer();
    return value % 2 === 0 ? value / 2 : -(value + 1) / 2;
  }

  /** Many integers at once, each below 2^32. */
  integers(length: number): Uint32Array {
    const { bytes } = this;
    const values = new Uint32Array(length);
    let at = this.at;
    for (let i = 0; i < length; i++) {
      let byte = bytes[at++] as number;
      let value = byte & 127;
      for (let shift = 7; byte > 127; shift += 7) {
        byte = bytes[at++] as number;
        value |= (byte & 127) << shift;
      }
      values[i] = value;
    }
    // Past the end every byte reads as undefined and ends its number.
    if (at > bytes.length) throw new RangeError("a reading block ends too soon");
    this.at = at;
    return values;
  }

  /**
   * Fills `values` with numbers kept as differences of whole `scale`-ths, each one higher and its
   * sign in the last bit; 0 is NaN. No array between the bytes and the numbers: a chart of a year
   * reads a million and a half of them.
   */
  differences(values: Float64Array, scale: number): void {
    const { bytes } = this;
    let at = this.at;
    let whole = 0;
    for (let i = 0; i < values.length; i++) {
      let code = bytes[at++] as number;
      if (code > 127) {
        let byte = code;
        code &= 127;
        for (let shift = 7; byte > 127; shift += 7) {
          byte = bytes[at++] as number;
          code |= (byte & 127) << shift;
        }
      }
      if (code === 0) {
        values[i] = NaN;
        continue;
      }
      // −1 where the number falls: noise falls and rises at random, which a branch cannot guess.
      const falls = (code & 1) - 1;
      whole += ((code >>> 1) ^ falls) - falls;
      values[i] = whole / scale;
    }
    // Past the end every byte reads as undefined and ends its number.
    if (at > bytes.length) throw new RangeError("a reading block ends too soon");
    this.at = at;
  }

  /** Fills `values`. */
  doubles(values: Float64Array): void {
    const bytes = this.raw(values.length * 8);
    const view = new DataView(bytes.buffer, bytes.byteOffset);
    for (let i = 0; i < values.length; i++) values[i] = view.getFloat64(i * 8, true);
  }
}
