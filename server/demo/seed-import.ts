import { Readable } from "node:stream";
import { setTimeout as sleep } from "node:timers/promises";
import type { ImportState } from "@shared/contracts/imports";
import type { FileRecipe } from "@shared/domain/log-files/recipe";
import * as commands from "@server/imports/change-import";
import { LogFile } from "@server/models/log-file";
import { LogImport } from "@server/models/log-import";
import type { DemoLogFile } from "./demo-log-files";

/** Waiting for a job is polling: the job's worker tells the database, not us. */
const pollMs = 40;

/**
 * Brings one of the demo's files in as its surveyor would: uploads it, answers what it does not
 * say, leaves weak signals out and confirms. Goes on from wherever a killed server had come to, and
 * does nothing where the file is in.
 * @throws Error where the import fails, with its reason.
 */
export async function importDemoFile(
  importing: commands.Importing,
  pointId: string,
  file: DemoLogFile,
  signal: AbortSignal,
): Promise<void> {
  const { files } = importing.services;
  const stored = await files.put(Readable.from([Buffer.from(file.bytes)]));
  const importId = await openWith(importing, pointId, file.name, stored);
  for (;;) {
    signal.throwIfAborted();
    const row = await importing.scope.get(LogImport, importId, "import");
    if (row.state === "imported") return;
    await step[row.state](importing, row, file);
    await sleep(pollMs);
  }
}

/** The import that holds this file, or one that was opened and left empty, or a new one. */
async function openWith(
  importing: commands.Importing,
  pointId: string,
  name: string,
  stored: { readonly sha256: string; readonly byteLength: number },
): Promise<string> {
  const { scope } = importing;
  const where = { pointId, sha256: stored.sha256 };
  const known = await scope.find(LogFile, { where, order: [["id", "DESC"]] });
  if (known) return known.importId;
  const empty = await scope.find(LogImport, { where: { pointId, state: "open" } });
  const { id } = empty ?? (await commands.openImport(importing, pointId));
  await commands.addFile(importing, id, { name, container: null, ...stored });
  return id;
}

type Step = (importing: commands.Importing, row: LogImport, file: DemoLogFile) => Promise<unknown>;

/** A job is at it. */
const wait: Step = () => Promise.resolve();
const takeUp: Step = (importing, row) => commands.reopen(importing, row.id);

const step: Readonly<Record<Exclude<ImportState, "imported">, Step>> = {
  open: wait,
  reading: wait,
  checking: wait,
  importing: wait,
  asking: answer,
  ready: (importing, row) => commands.confirm(importing, row.id),
  undone: takeUp,
  cancelled: takeUp,
  failed(_importing, { failure }, { name }) {
    throw new Error(`The demo's ${name} was not imported: ${failure?.detail ?? "no reason given"}`);
  },
};

/** First what each file leaves open, then what the check asks. */
async function answer(
  importing: commands.Importing,
  row: LogImport,
  { clock, seriesKind, name }: DemoLogFile,
): Promise<void> {
  const [file] = await importing.scope.list(LogFile, { where: { importId: row.id } });
  if (!file?.recipe) throw new Error(`The demo's ${name} cannot be read.`);
  if ((file.questions ?? []).length > 0) {
    const recipe: FileRecipe = {
      ...file.recipe,
      seriesKind,
      time: { ...file.recipe.time, clock },
    };
    await commands.giveRecipe(importing, row.id, file.id, recipe);
    return;
  }
  const undecided = row.checks?.undecided ?? [];
  const other = undecided.filter((choice) => choice !== "weakSignal");
  if (other.length > 0) throw new Error(`The demo's ${name} asks for ${other.join(", ")}.`);
  await commands.giveRepairs(importing, row.id, { weakSignal: "exclude" });
}
