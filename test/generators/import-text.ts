import { createLogReader } from "@shared/domain/log-files/log-reader";
import {
  DEFAULT_REPAIR_CHOICES,
  type FileRecipe,
  type LoggerClock,
  type RepairChoices,
} from "@shared/domain/log-files/recipe";
import { recogniseLogFile } from "@shared/domain/log-files/recognise-log-file";
import type { Question, Recognition } from "@shared/domain/log-files/recognition";
import {
  resolveRows,
  type PointFacts,
  type ResolvedRows,
} from "@shared/domain/log-files/resolve-rows";
import type { ReadingSegment } from "@shared/domain/readings/reading-columns";

/** What a person says about a file that does not prove it. */
export interface SaidOfFile {
  readonly clock?: LoggerClock;
  readonly zone?: string;
  readonly recipe?: (recipe: FileRecipe) => FileRecipe;
  readonly repair?: Partial<RepairChoices>;
  readonly facts?: PointFacts;
}

export interface ImportedText {
  readonly recognition: Recognition;
  readonly asked: readonly Question["code"][];
  readonly resolved: ResolvedRows;
  readonly segment: ReadingSegment | null;
}

/** A file's bytes through recognition, reading and resolving, as preview and commit do it. */
export function importBytes(bytes: Uint8Array, said: SaidOfFile = {}): ImportedText {
  const recognition = recogniseLogFile(bytes);
  if ("code" in recognition)
    throw new Error(`unreadable: ${recognition.code}, line ${String(recognition.line)}`);
  const { clock, zone = "UTC", repair, facts } = said;
  const given = said.recipe?.(recognition.recipe) ?? recognition.recipe;
  const recipe = clock ? { ...given, time: { ...given.time, clock } } : given;
  const reader = createLogReader(recipe);
  reader.push(bytes);
  const choices = { ...DEFAULT_REPAIR_CHOICES, ...repair };
  const resolved = resolveRows(reader.end(), recipe, choices, zone, facts);
  const { columns, nominalStepMs } = resolved;
  return {
    recognition,
    asked: recognition.questions.map(({ code }) => code),
    resolved,
    segment: columns && { kind: recipe.seriesKind, nominalStepMs: nominalStepMs ?? 0, columns },
  };
}

export const importText = (text: string, said?: SaidOfFile): ImportedText =>
  importBytes(new TextEncoder().encode(text), said);
