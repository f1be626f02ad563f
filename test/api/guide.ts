import { readFileSync } from "node:fs";
import path from "node:path";

export const docsFolder = path.join(__dirname, "..", "..", "docs");

/** All shell lines of the API guide in their order, as one script. */
export function guideScript(): string {
  const text = readFileSync(path.join(docsFolder, "api.md"), "utf8");
  const blocks = [...text.matchAll(/^```sh\n([\s\S]*?)^```$/gm)].map(([, lines]) => lines ?? "");
  return blocks.join("\n");
}

/** Rows of one of the guide's example files: UTC milliseconds and numbers. London keeps UTC + 1 h in May. */
export function exampleRows(name: string): { atMs: number; values: number[] }[] {
  const text = readFileSync(path.join(docsFolder, "examples", name), "utf8");
  return text
    .split("\n")
    .filter((line) => /^\d{4}-/.test(line))
    .map((line) => {
      const [time = "", ...cells] = line.split(",");
      return { atMs: Date.parse(`${time.replace(" ", "T")}:00+01:00`), values: cells.map(Number) };
    });
}
