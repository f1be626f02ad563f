import { setTimeout as sleep } from "node:timers/promises";
import type { ImportDetail, ImportState } from "@shared/contracts/imports";
import type { Loop, Point, Site } from "@shared/contracts/places";
import type { BenchServer } from "./bench-server";

/** A point to import into; each import of the bench gets a fresh one. */
export async function newPoint(server: BenchServer, site: Site, tag: string): Promise<string> {
  const loop = await server.send<Loop>("POST", `/sites/${site.id}/loops`, {
    tag,
    name: "Bench loop",
    service: "chilled",
    gaugePressureMPa: 0.4,
  });
  const point = await server.send<Point>("POST", `/loops/${loop.id}/points`, {
    code: tag,
    name: "Main",
    role: "main",
    meterSide: "return",
  });
  return point.id;
}

export function newSite(server: BenchServer): Promise<Site> {
  return server.send<Site>("POST", "/sites", { name: "Bench", zone: "Etc/UTC", currency: "EUR" });
}

/** As a script would: asking more often would make the server answer us instead of working. */
const pollMs = 50;

async function until(
  server: BenchServer,
  importId: string,
  states: readonly ImportState[],
): Promise<ImportDetail> {
  for (;;) {
    const detail = await server.get<ImportDetail>(`/imports/${importId}`);
    if (states.includes(detail.state)) return detail;
    if (detail.state === "failed")
      throw new Error(`the import failed: ${detail.failure?.detail ?? "no reason"}`);
    await sleep(pollMs);
  }
}

export interface ImportTimes {
  /** From "store it" to stored: read, resolve, store, energy, all in the job's worker. */
  readonly storeS: number;
  /** From the first byte sent to stored: upload, recognition and the checks as well. */
  readonly wholeS: number;
  readonly coolingKwh: number;
  readonly rowsStored: number;
}

/** Where an import has come to. */
export type Milestone = "uploaded" | "recognised" | "checked" | "stored";

/** The whole way of one file through the API, as a script goes it. */
export async function importFile(
  server: BenchServer,
  pointId: string,
  name: string,
  bytes: Buffer,
  onMilestone: (milestone: Milestone) => void = () => undefined,
): Promise<ImportTimes> {
  const started = performance.now();
  const { id } = await server.send<ImportDetail>("POST", `/points/${pointId}/imports`);
  await server.upload<ImportDetail>(`/imports/${id}/files`, name, bytes);
  onMilestone("uploaded");
  const { files } = await until(server, id, ["asking"]);
  onMilestone("recognised");
  const file = files[0];
  if (!file?.recipe) throw new Error("the bench's file was not recognised");
  await server.send("PUT", `/imports/${id}/files/${file.id}/recipe`, {
    ...file.recipe,
    time: { ...file.recipe.time, clock: { kind: "utc" } },
  });
  await until(server, id, ["ready"]);
  onMilestone("checked");
  const confirmed = performance.now();
  await server.send("POST", `/imports/${id}/confirm`);
  const done = await until(server, id, ["imported"]);
  const ended = performance.now();
  onMilestone("stored");
  return {
    storeS: (ended - confirmed) / 1000,
    wholeS: (ended - started) / 1000,
    coolingKwh: done.checks?.energy?.coolingKwh ?? NaN,
    rowsStored: done.rowsStored ?? 0,
  };
}
