import { readFileSync } from "node:fs";
import { join } from "node:path";

/** Rows of a file under the repository's root, as text by column name. */
export function readCsv(path: string, separator = ","): Record<string, string>[] {
  const [header = "", ...lines] = readFileSync(join(process.cwd(), path), "utf8")
    .trim()
    .split(/\r?\n/);
  const names = header.split(separator);
  return lines.map((line) => {
    const cells = line.split(separator);
    return Object.fromEntries(names.map((name, i) => [name, cells[i] ?? ""]));
  });
}

export function readJson(path: string): unknown {
  return JSON.parse(readFileSync(join(process.cwd(), path), "utf8"));
}

/** |measured ÷ expected − 1|. */
export function relativeError(measured: number, expected: number): number {
  return Math.abs(measured / expected - 1);
}
