import os from "node:os";
import { setFlagsFromString } from "node:v8";
import { runInNewContext } from "node:vm";
import { connectDatabase, type Database } from "@server/database/connect";
import { FolderFileStore } from "@server/files/folder-file-store";
import type { JobOutcome } from "./job-outcome";
import { runJob } from "./run-job";
import { Wish, type WorkerTask } from "./worker-protocol";

const wishNames = {
  [Wish.goOn]: "go on",
  [Wish.drop]: "drop",
  [Wish.handBack]: "hand back",
} as const;
type WishCode = keyof typeof wishNames;

/** Row loops report far more often than anybody looks. */
const reportEveryMs = 100;

let opened: { readonly url: string; readonly database: Database } | undefined;

/** A worker works on one database for as long as it lives; opening a pool per job costs 30 ms. */
function databaseOf(url: string): Database {
  if (opened?.url !== url) opened = { url, database: connectDatabase(url, { poolSize: 2 }) };
  return opened.database;
}

let isNice = false;

/** Requests come before imports. On Linux the priority is this thread's alone. */
function beNice(): void {
  if (isNice || process.platform !== "linux") return;
  isNice = true;
  try {
    os.setPriority(0, 10);
  } catch (error) {
    // A container may forbid it; imports then share the processor evenly.
    console.warn(`import worker keeps its priority: ${String(error)}`);
  }
}

const muchBytes = 64 * 2 ** 20;
let collect: (() => void) | undefined;

/**
 * Gives the memory of a large file's columns back when its job ends. The collector would wait until
 * the next job has taken as much again.
 */
function letGo(): void {
  if (process.memoryUsage().arrayBuffers < muchBytes) return;
  if (collect === undefined) {
    setFlagsFromString("--expose-gc");
    collect = runInNewContext("gc") as () => void;
  }
  collect();
}

export async function runInWorker(task: WorkerTask): Promise<JobOutcome> {
  beNice();
  const wish = new Int32Array(task.wish);
  let reportedAt = 0;
  let stage = "";
  try {
    return await runJob(task.job, {
      database: databaseOf(task.databaseUrl),
      files: new FolderFileStore(task.dataDir),
      owner: task.owner,
      wanted: () => wishNames[Atomics.load(wish, 0) as WishCode],
      onProgress(progress) {
        const now = performance.now();
        if (progress.stage === stage && now - reportedAt < reportEveryMs) return;
        stage = progress.stage;
        reportedAt = now;
        task.port.postMessage(progress);
      },
    });
  } finally {
    task.port.close();
    letGo();
  }
}
