import type { StatusWord } from "./recognition";

/** Words that usually mean a good or a bad reading; only ever proposed, as nothing in a file proves them. */
const GOOD: ReadonlySet<string> = new Set([
  "ok",
  "good",
  "normal",
  "valid",
  "gut",
  "gültig",
  "in ordnung",
  "measuring",
  "messung",
  "bon",
  "valide",
]);
const BAD: ReadonlySet<string> = new Set([
  "bad",
  "error",
  "err",
  "fault",
  "fail",
  "failed",
  "failure",
  "invalid",
  "alarm",
  "no signal",
  "low signal",
  "lost",
  "empty pipe",
  "overrange",
  "underrange",
  "fehler",
  "störung",
  "stoerung",
  "ungültig",
  "kein signal",
  "schlecht",
  "erreur",
  "défaut",
  "mauvais",
]);

/** What a word of a status column usually means; null for one that tells nothing. */
export function likelyMeaning(word: string): StatusWord["likely"] {
  const plain = word.trim().toLowerCase();
  if (GOOD.has(plain)) return "good";
  return BAD.has(plain) ? "bad" : null;
}

/** The words of a column, the most frequent first, each with what it usually means. */
export function statusWordsOf(counts: Readonly<Record<string, number>>): readonly StatusWord[] {
  return Object.entries(counts)
    .map(([word, count]) => ({ word, count, likely: likelyMeaning(word) }))
    .sort((a, b) => b.count - a.count || a.word.localeCompare(b.word));
}

/** More different words than this are remarks, not a status. */
export const MAX_STATUS_WORDS = 40;
const MAX_WORD_BYTES = 60;

const decoder = new TextDecoder("utf-8");

/**
 * The different words of one column in the order they come, each with its count. A column mostly
 * repeats the word above, so that is compared byte by byte and no string made of it.
 */
export class WordList {
  readonly words: string[] = [];
  readonly counts: number[] = [];
  private readonly codes = new Map<string, number>();
  private readonly last = new Uint8Array(MAX_WORD_BYTES);
  private lastLength = -1;
  private lastCode = 0;

  /** @param most different words that are kept; any further one shares the last place */
  constructor(private readonly most = MAX_STATUS_WORDS) {}

  /** Counts the word and returns its place in {@link words}. */
  add(bytes: Uint8Array, from: number, to: number): number {
    const length = Math.min(to - from, MAX_WORD_BYTES);
    if (!this.isLast(bytes, from, length)) this.find(bytes, from, length);
    this.counts[this.lastCode] = (this.counts[this.lastCode] as number) + 1;
    return this.lastCode;
  }

  get isFull(): boolean {
    return this.words.length > this.most;
  }

  private isLast(bytes: Uint8Array, from: number, length: number): boolean {
    if (length !== this.lastLength) return false;
    for (let i = 0; i < length; i++) if (bytes[from + i] !== this.last[i]) return false;
    return true;
  }

  private find(bytes: Uint8Array, from: number, length: number): void {
    const text = decoder.decode(bytes.subarray(from, from + length)).trim();
    const word = this.codes.has(text) || this.words.length < this.most ? text : "…";
    let code = this.codes.get(word);
    if (code === undefined) {
      code = this.words.push(word) - 1;
      this.counts.push(0);
      this.codes.set(word, code);
    }
    for (let i = 0; i < length; i++) this.last[i] = bytes[from + i] as number;
    this.lastLength = length;
    this.lastCode = code;
  }
}
