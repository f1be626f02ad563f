import type { TextEncoding } from "./recipe";

/** How the bytes of a file spell characters, and whether the bytes prove it. */
export interface EncodingFinding {
  readonly encoding: TextEncoding;
  /** Bytes of the byte-order mark at the start, 0 without one. */
  readonly markBytes: 0 | 2 | 3;
  readonly certainty: "proved" | "likely";
}

/** Control characters that text files do not hold; a few may be line noise, many mean another kind of file. */
const MAX_CONTROL_SHARE = 0.01;

/**
 * Finds the encoding from the first bytes of a file (some tens of KiB are enough).
 * Returns null when the bytes are not text at all.
 */
export function detectEncoding(head: Uint8Array): EncodingFinding | null {
  if (head[0] === 0xef && head[1] === 0xbb && head[2] === 0xbf) {
    return { encoding: "utf-8", markBytes: 3, certainty: "proved" };
  }
  if (head[0] === 0xff && head[1] === 0xfe) {
    return { encoding: "utf-16le", markBytes: 2, certainty: "proved" };
  }
  if (head[0] === 0xfe && head[1] === 0xff) {
    return { encoding: "utf-16be", markBytes: 2, certainty: "proved" };
  }
  const zeros = countZeros(head);
  const pairs = Math.max(1, head.length >> 1);
  // Logger text is mostly ASCII, so in UTF-16 nearly every second byte is zero, always on the same side.
  if (zeros.odd > pairs * 0.7 && zeros.even < pairs * 0.02) {
    return { encoding: "utf-16le", markBytes: 0, certainty: "likely" };
  }
  if (zeros.even > pairs * 0.7 && zeros.odd < pairs * 0.02) {
    return { encoding: "utf-16be", markBytes: 0, certainty: "likely" };
  }
  if (zeros.even + zeros.odd > 0 || controlShare(head) > MAX_CONTROL_SHARE) return null;
  const validity = utf8Validity(head);
  if (validity === "invalid") {
    return { encoding: "windows-1252", markBytes: 0, certainty: "likely" };
  }
  return { encoding: "utf-8", markBytes: 0, certainty: validity === "valid" ? "proved" : "likely" };
}

function countZeros(bytes: Uint8Array): { even: number; odd: number } {
  let even = 0;
  let odd = 0;
  for (let i = 0; i < bytes.length; i++) {
    if (bytes[i] !== 0) continue;
    if ((i & 1) === 0) even++;
    else odd++;
  }
  return { even, odd };
}

function controlShare(bytes: Uint8Array): number {
  let controls = 0;
  for (let i = 0; i < bytes.length; i++) {
    const byte = bytes[i] as number;
    if (byte < 32 && byte !== 9 && byte !== 10 && byte !== 13 && byte !== 12 && byte !== 26)
      controls++;
  }
  return bytes.length === 0 ? 0 : controls / bytes.length;
}

/**
 * Whether bytes are pure ASCII, UTF-8 with other characters, or not UTF-8.
 * A sequence cut off by the end of the bytes does not count against them.
 */
export function utf8Validity(bytes: Uint8Array): "ascii" | "valid" | "invalid" {
  let ascii = true;
  for (let i = 0; i < bytes.length;) {
    const byte = bytes[i] as number;
    if (byte < 0x80) {
      i++;
      continue;
    }
    ascii = false;
    const length =
      byte >= 0xc2 && byte < 0xe0
        ? 2
        : byte >= 0xe0 && byte < 0xf0
          ? 3
          : byte >= 0xf0 && byte < 0xf5
            ? 4
            : 0;
    if (length === 0) return "invalid";
    for (let k = 1; k < length; k++) {
      if (i + k >= bytes.length) return "valid";
      if (((bytes[i + k] as number) & 0xc0) !== 0x80) return "invalid";
    }
    i += length;
  }
  return ascii ? "ascii" : "valid";
}

/** Turns a stream of bytes in any of our encodings into UTF-8 bytes without byte-order mark. */
export interface Utf8Stream {
  /** The returned bytes may be a view of `chunk`; use them before the chunk changes. */
  convert(chunk: Uint8Array): Uint8Array;
  /** What is left at the end of the file: half a character becomes U+FFFD. */
  finish(): Uint8Array;
}

export function createUtf8Stream(encoding: TextEncoding): Utf8Stream {
  switch (encoding) {
    case "utf-8":
      return new MarkStripper();
    case "windows-1252":
      return { convert: windows1252ToUtf8, finish: () => EMPTY };
    case "utf-16le":
      return new Utf16Stream(0, 1);
    case "utf-16be":
      return new Utf16Stream(1, 0);
  }
}

const EMPTY = new Uint8Array(0);

class MarkStripper implements Utf8Stream {
  private started = false;
  /** A first chunk of one or two bytes may be the start of a mark. */
  private held: Uint8Array = EMPTY;

  convert(chunk: Uint8Array): Uint8Array {
    if (this.started) return chunk;
    const bytes = this.held.length === 0 ? chunk : concatBytes(this.held, chunk);
    if (bytes.length < 3) {
      this.held = copyBytes(bytes);
      return EMPTY;
    }
    this.started = true;
    this.held = EMPTY;
    return bytes[0] === 0xef && bytes[1] === 0xbb && bytes[2] === 0xbf ? bytes.subarray(3) : bytes;
  }

  finish(): Uint8Array {
    const rest = this.held;
    this.held = EMPTY;
    this.started = true;
    return rest;
  }
}

/** What Windows-1252 puts where Latin-1 has the C1 controls (Unicode's mapping file CP1252.TXT). */
const WINDOWS_1252_HIGH: readonly number[] = [
  0x20ac, 0x81, 0x201a, 0x192, 0x201e, 0x2026, 0x2020, 0x2021, 0x2c6, 0x2030, 0x160, 0x2039, 0x152,
  0x8d, 0x17d, 0x8f, 0x90, 0x2018, 0x2019, 0x201c, 0x201d, 0x2022, 0x2013, 0x2014, 0x2dc, 0x2122,
  0x161, 0x203a, 0x153, 0x9d, 0x17e, 0x178,
];

function windows1252ToUtf8(chunk: Uint8Array): Uint8Array {
  let high = 0;
  for (let i = 0; i < chunk.length; i++) high += (chunk[i] as number) >> 7;
  if (high === 0) return chunk;
  const out = new Uint8Array(chunk.length + high * 2);
  let at = 0;
  for (let i = 0; i < chunk.length; i++) {
    const byte = chunk[i] as number;
    if (byte < 0x80) out[at++] = byte;
    else at = writeUtf8(out, at, byte < 0xa0 ? (WINDOWS_1252_HIGH[byte - 0x80] as number) : byte);
  }
  return out.subarray(0, at);
}

class Utf16Stream implements Utf8Stream {
  private started = false;
  private oddByte = -1;
  private highSurrogate = 0;

  constructor(
    private readonly lowAt: 0 | 1,
    private readonly highAt: 0 | 1,
  ) {}

  convert(chunk: Uint8Array): Uint8Array {
    const bytes = this.oddByte < 0 ? chunk : concatBytes(Uint8Array.of(this.oddByte), chunk);
    const even = bytes.length & ~1;
    this.oddByte = bytes.length > even ? (bytes[even] as number) : -1;
    const out = new Uint8Array((even >> 1) * 3 + 4);
    let at = 0;
    for (let i = 0; i < even; i += 2) {
      const unit = (bytes[i + this.lowAt] as number) | ((bytes[i + this.highAt] as number) << 8);
      if (!this.started) {
        this.started = true;
        if (unit === 0xfeff) continue;
      }
      if (unit < 0x80 && this.highSurrogate === 0) out[at++] = unit;
      else at = this.writeUnit(out, at, unit);
    }
    return out.subarray(0, at);
  }

  private writeUnit(out: Uint8Array, from: number, unit: number): number {
    let at = from;
    const high = this.highSurrogate;
    this.highSurrogate = 0;
    if (high !== 0 && unit >= 0xdc00 && unit < 0xe000) {
      return writeUtf8(out, at, 0x10000 + ((high - 0xd800) << 10) + (unit - 0xdc00));
    }
    if (high !== 0) at = writeUtf8(out, at, 0xfffd);
    if (unit >= 0xd800 && unit < 0xdc00) {
      this.highSurrogate = unit;
      return at;
    }
    return writeUtf8(out, at, unit >= 0xdc00 && unit < 0xe000 ? 0xfffd : unit);
  }

  finish(): Uint8Array {
    const broken = this.oddByte >= 0 || this.highSurrogate !== 0;
    this.oddByte = -1;
    this.highSurrogate = 0;
    return broken ? Uint8Array.of(0xef, 0xbf, 0xbd) : EMPTY;
  }
}

function writeUtf8(out: Uint8Array, from: number, codePoint: number): number {
  let at = from;
  if (codePoint < 0x80) {
    out[at++] = codePoint;
  } else if (codePoint < 0x800) {
    out[at++] = 0xc0 | (codePoint >> 6);
    out[at++] = 0x80 | (codePoint & 0x3f);
  } else if (codePoint < 0x10000) {
    out[at++] = 0xe0 | (codePoint >> 12);
    out[at++] = 0x80 | ((codePoint >> 6) & 0x3f);
    out[at++] = 0x80 | (codePoint & 0x3f);
  } else {
    out[at++] = 0xf0 | (codePoint >> 18);
    out[at++] = 0x80 | ((codePoint >> 12) & 0x3f);
    out[at++] = 0x80 | ((codePoint >> 6) & 0x3f);
    out[at++] = 0x80 | (codePoint & 0x3f);
  }
  return at;
}

/** A copy of its own: the `slice` of a Node.js Buffer would be a view of bytes the caller may write over. */
export function copyBytes(bytes: Uint8Array): Uint8Array {
  return new Uint8Array(bytes);
}

export function concatBytes(first: Uint8Array, second: Uint8Array): Uint8Array {
  const out = new Uint8Array(first.length + second.length);
  out.set(first, 0);
  out.set(second, first.length);
  return out;
}
