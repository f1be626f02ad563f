import type { LogFile } from "@server/models/log-file";
import { serialOf } from "./recipes";

const mostCharacters = 60;

/** A name for a recipe saved from a file: its logger's serial, or what its columns are called. */
export function proposedRecipeName(file: LogFile): string {
  const serial = serialOf(file);
  if (serial !== null) return serial;
  const headers = (file.recipe?.columns ?? [])
    .filter(({ meaning, header }) => meaning !== "skip" && header !== "")
    .map(({ header }) => header);
  const text = headers.join(", ");
  if (text === "") return file.name.slice(0, mostCharacters);
  return text.length <= mostCharacters ? text : `${text.slice(0, mostCharacters - 1)}…`;
}
