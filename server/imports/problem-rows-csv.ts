import { createWriteStream, type WriteStream } from "node:fs";
import { once } from "node:events";
import { finished } from "node:stream/promises";
import { createProblemReader, type ProblemRow } from "@shared/domain/log-files/problem-rows";
import type { FileRecipe, RepairChoices } from "@shared/domain/log-files/recipe";
import { createUtf8Stream } from "@shared/domain/log-files/text-encoding";
import type { Language } from "@shared/formats/language";
import { csvRecord, textCell } from "@server/queries/energy/csv-cells";
import { problemRowWords, type ProblemRowWords } from "@server/words/problem-row-words";
import { readChunks } from "./read-log-file";

/** A file whose problems are wanted; everything in it can cross threads. */
export interface ProblemFile {
  readonly name: string;
  readonly path: string;
  readonly recipe: FileRecipe;
  readonly expectedRows: number;
}

export interface ProblemTask {
  readonly kind: "problems";
  readonly files: readonly ProblemFile[];
  readonly choices: RepairChoices;
  readonly zone: string;
  readonly language: Language;
  readonly most: number;
  /** Where the CSV is written to. */
  readonly target: string;
}

// A byte order mark: without it spreadsheets read umlauts as another encoding.
const byteOrderMark = "\uFEFF";
const mostCharacters = 500;
/** Of a row, in UTF-8: no character takes more than four. */
const mostBytes = 4 * mostCharacters;

/** Reads files once for their problems and once for the rows' texts; writes one record a problem. */
export async function writeProblemRows(task: ProblemTask): Promise<void> {
  const words = problemRowWords(task.language);
  const out = createWriteStream(task.target, { mode: 0o600 });
  out.write(byteOrderMark + csvRecord(words.head.map(textCell)));
  let room = task.most;
  let unlisted = 0;
  for (const file of task.files) {
    const { rows, count } = problemsOf(file, task, room);
    room -= rows.length;
    unlisted += count - rows.length;
    for (const records of recordsOf(file, rows, words)) await write(out, records);
  }
  if (unlisted > 0) {
    const [more, remedy] = [words.more(unlisted), words.moreRemedy].map(textCell);
    out.write(csvRecord(["", "", "", "", "", "more", more ?? "", remedy ?? ""]));
  }
  out.end();
  await finished(out);
}

async function write(out: WriteStream, text: string): Promise<void> {
  if (!out.write(text)) await once(out, "drain");
}

function problemsOf(file: ProblemFile, { choices, zone }: ProblemTask, room: number) {
  const reader = createProblemReader(file.recipe, room, file.expectedRows);
  readChunks(file.path, (bytes) => reader.push(bytes));
  return reader.end(choices, zone);
}

/** Records of a file's problems, some at a time, with the text of each row put beside them. */
function* recordsOf(
  file: ProblemFile,
  rows: readonly ProblemRow[],
  words: ProblemRowWords,
): Generator<string> {
  const texts = textsOf(file, rows);
  let records = "";
  for (const { line, column, cell, reason } of rows) {
    records += csvRecord(
      [
        file.name,
        String(line),
        texts.get(line) ?? "",
        column ?? "",
        cell ?? "",
        reason,
        words.reason[reason],
        words.remedy[reason],
      ].map(textCell),
    );
    if (records.length < 1 << 16) continue;
    yield records;
    records = "";
  }
  if (records !== "") yield records;
}

const LINE_FEED = 10;
const CARRIAGE_RETURN = 13;

/** The texts of the lines that have a problem, as they stand in the file. */
function textsOf(file: ProblemFile, rows: readonly ProblemRow[]): Map<number, string> {
  const wanted = [...new Set(rows.map(({ line }) => line))];
  const texts = new Map<number, string>();
  const stream = createUtf8Stream(file.recipe.dialect.encoding);
  const decoder = new TextDecoder();
  let next = 0;
  let line = 1;
  let isAfterReturn = false;
  let begun: number[] = [];
  const endLine = (bytes: Uint8Array, from: number, to: number): void => {
    if (wanted[next] === line) {
      const whole = Uint8Array.from([
        ...begun,
        ...bytes.subarray(from, Math.min(to, from + mostBytes)),
      ]);
      texts.set(line, decoder.decode(whole).slice(0, mostCharacters));
      next++;
    }
    begun = [];
    line++;
  };
  const take = (bytes: Uint8Array): void => {
    let from = 0;
    for (let at = 0; at < bytes.length && next < wanted.length; at++) {
      const byte = bytes[at];
      if (byte === LINE_FEED && isAfterReturn) from = at + 1;
      else if (byte === LINE_FEED || byte === CARRIAGE_RETURN) {
        endLine(bytes, from, at);
        from = at + 1;
      }
      isAfterReturn = byte === CARRIAGE_RETURN;
    }
    // The rest belongs to a line that goes on in the next chunk.
    if (begun.length < mostBytes) begun.push(...bytes.subarray(from, from + mostBytes));
  };
  if (wanted.length === 0) return texts;
  readChunks(file.path, (bytes) => {
    if (next < wanted.length) take(stream.convert(bytes));
  });
  const last = stream.finish();
  take(last);
  endLine(last, last.length, last.length);
  return texts;
}
