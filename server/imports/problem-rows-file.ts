import { MAX_PROBLEM_ROWS } from "@shared/contracts/import-results";
import { openQuestions } from "@shared/domain/log-files/open-questions";
import type { Language } from "@shared/formats/language";
import type { Context } from "@server/http/context";
import { Conflict } from "@server/http/errors";
import type { FileAnswer } from "@server/http/file-answer";
import type { LogFile } from "@server/models/log-file";
import type { LogImport } from "@server/models/log-import";
import { csvFileName } from "@server/queries/energy/csv-cells";
import { loadEnergySettings } from "@server/readings/energy-settings";
import { problemRowWords } from "@server/words/problem-row-words";
import type { ProblemFile } from "./problem-rows-csv";
import { filesOf } from "./settle-import";

/** Codes of answers without which not even the rows of a file can be told. */
const needed = ["timeColumn", "dateOrder"];

/**
 * Every row with a problem of an import's files, with the choices made so far.
 * @throws Conflict while a file cannot be read by its recipe
 */
export async function problemRowsFile(
  { services, database }: Context,
  row: LogImport,
  language: Language,
): Promise<FileAnswer["file"]> {
  const readable: ProblemFile[] = [];
  for (const file of await filesOf(row)) {
    if (file.unreadable === null) readable.push(await asked(services, file));
  }
  if (readable.length === 0)
    throw new Conflict("no-file", "No file of this import can be read.", "Add one that can.");
  const { zone } = await loadEnergySettings(database, row.pointId);
  const { body, byteLength } = await services.logs.problemRows({
    files: readable,
    choices: row.repair,
    zone,
    language,
    most: MAX_PROBLEM_ROWS,
  });
  const [first] = readable;
  return {
    name: csvFileName([first?.name ?? "", problemRowWords(language).fileName]),
    contentType: "text/csv; charset=utf-8",
    body,
    byteLength,
  };
}

async function asked({ files }: Context["services"], file: LogFile): Promise<ProblemFile> {
  const { recipe, recognition, name, sha256 } = file;
  if (recipe === null || recognition === null)
    throw new Conflict(
      "file-not-recognised",
      `${name} is still being read.`,
      "Wait until it is recognised.",
    );
  if (openQuestions(recipe).some(({ code }) => needed.includes(code)))
    throw new Conflict(
      "questions-open",
      `Nobody knows yet how the times of ${name} are written.`,
      "Answer the question about its dates first.",
    );
  const path = await files.localPath(sha256);
  return { name, path, recipe, expectedRows: recognition.dataRowCount };
}
