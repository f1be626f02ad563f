import type { Unreadable } from "@shared/domain/log-files/recognition";

/** Ends an unpacking for what a person has to put right; becomes the file's `unreadable`. */
export class UnpackRefused extends Error {
  readonly unreadable: Unreadable;

  /** @param cell what was seen: the member, the sheet, the names */
  constructor(code: Unreadable["code"], cell: string | null, line: number | null = null) {
    super(`${code}${cell === null ? "" : `: ${cell}`}`);
    this.name = "UnpackRefused";
    this.unreadable = { code, line, cell: cell === null ? null : cell.slice(0, 600) };
  }
}

/** The code of an error as Node.js and zlib give it, "" for one without. */
export function errorCode(error: unknown): string {
  return typeof error === "object" && error !== null && "code" in error ? String(error.code) : "";
}
