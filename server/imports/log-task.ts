import { closeSync, openSync, readSync } from "node:fs";
import { loggerSerial } from "@shared/domain/log-files/logger-serial";
import { HEAD_BYTES, isUnreadable, recogniseHead } from "@shared/domain/log-files/recognise-head";
import { writeProblemRows, type ProblemTask } from "./problem-rows-csv";

/** What the thread is asked; everything in it can cross threads. */
export type LogTask = { readonly kind: "serial"; readonly path: string } | ProblemTask;

export async function runLogTask(task: LogTask): Promise<string | null> {
  if (task.kind === "problems") {
    await writeProblemRows(task);
    return null;
  }
  const head = recogniseHead(...headOf(task.path));
  return isUnreadable(head) ? null : loggerSerial(head.header.preamble);
}

function headOf(path: string): [head: Uint8Array, isWhole: boolean] {
  const buffer = new Uint8Array(HEAD_BYTES + 1);
  const file = openSync(path, "r");
  try {
    const length = readSync(file, buffer, 0, buffer.length, 0);
    return [buffer.subarray(0, Math.min(length, HEAD_BYTES)), length <= HEAD_BYTES];
  } finally {
    closeSync(file);
  }
}
