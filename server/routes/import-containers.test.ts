import type { ImportDetail } from "@shared/contracts/imports";
import { signedIn, type Agent } from "@server/testing/factories";
import { pointToMeter } from "@server/testing/place-factories";
import { runJobs } from "@server/testing/run-jobs";
import { testApp } from "@server/testing/test-app";
import { STYLE, workbookOf, zipOf } from "@test/generators/archives";

const app = testApp();

/** Twenty-five rows, five minutes apart: 28.8 m³/h, 6.90 → 12.80 °C, 197.798 kW. */
function log(flow = "28.80", name = "flow m3/h"): string {
  const rows = Array.from({ length: 25 }, (_, i) => {
    const at = new Date(Date.UTC(2025, 6, 14, 6) + i * 300_000).toISOString();
    return `${at},${flow},6.90,12.80`;
  });
  return [`time,${name},supply °C,return °C`, ...rows, ""].join("\n");
}

async function start() {
  const agent = await signedIn(app, { role: "surveyor" });
  const { point } = await pointToMeter(app, agent.organisationId);
  const { id } = (await agent.post(`/points/${point.id}/imports`).expect(201)).body as ImportDetail;
  return { agent, id, point };
}

async function upload(agent: Agent, importId: string, bytes: Buffer, name: string) {
  const answer = await agent.post(`/imports/${importId}/files`).attach("file", bytes, name);
  await runJobs(app);
  return answer;
}

async function read(agent: Agent, importId: string): Promise<ImportDetail> {
  return (await agent.get(`/imports/${importId}`).expect(200)).body as ImportDetail;
}

test("a zip becomes the files in it; the upload comes back byte for byte and the text as well", async () => {
  const { agent, id } = await start();
  const flow = log()
    .replace(/,6.90,12.80/g, "")
    .replace(",supply °C,return °C", "");
  const temperatures = log()
    .replace(/,28.80/g, "")
    .replace("flow m3/h,", "");
  const bytes = await zipOf({ "a/flow.csv": flow, "a/temperatures.csv": temperatures });
  const opened = await upload(agent, id, bytes, "visit.zip");
  expect(opened.body).toMatchObject({ state: "reading", files: [{ name: "visit.zip" }] });
  const detail = await read(agent, id);
  expect(detail).toMatchObject({ state: "ready", fileNames: ["flow.csv", "temperatures.csv"] });
  // 28.8 m³/h, 6.90 → 12.80 °C, meter on the return, for two hours.
  expect(detail.checks?.energy?.coolingKwh).toBeCloseTo(2 * 197.798, 2);
  const [first, second] = detail.files;
  expect(second?.source).toMatchObject({
    kind: "zip",
    name: "visit.zip",
    member: "a/temperatures.csv",
  });
  const path = `/imports/${id}/files`;
  const raw = await agent.get(`${path}/${first?.id}/raw`).buffer(true).expect(200);
  expect(raw.headers["content-disposition"]).toContain("visit.zip");
  expect(Buffer.compare(raw.body as Buffer, bytes)).toBe(0);
  const text = await agent.get(`${path}/${second?.id}/text`).buffer(true).expect(200);
  expect(text.body.toString()).toBe(temperatures);

  const again = await upload(agent, id, bytes, "again.zip");
  expect(again.body).toMatchObject({ code: "file-already-there" });
  const repacked = await zipOf({ "flow.csv": flow });
  await upload(agent, id, repacked, "repacked.zip");
  expect((await read(agent, id)).files[2]?.unreadable).toMatchObject({ code: "alreadyThere" });
});

test("a workbook's dates and numbers become energy, and a cell that cannot be read names its row", async () => {
  const { agent, id } = await start();
  const firstDay = Date.UTC(2025, 6, 14) / 86_400_000 + 25_569;
  const rows = Array.from({ length: 25 }, (_, i) => [
    { raw: String(firstDay + 6 / 24 + i / 288), style: STYLE.dateTime },
    i === 7 ? "broken" : 28.8,
    { raw: "6.9000000000000004" },
    12.8,
  ]);
  const header = ["Time UTC", "Flow m³/h", "Supply °C", "Return °C"];
  const bytes = await workbookOf({
    sheets: { Log: { rows: [["Serial", "50417"], header, ...rows] } },
  });
  await upload(agent, id, bytes, "July.xlsx");
  const { files, checks, state } = await read(agent, id);
  expect({ state, questions: files[0]?.questions }).toEqual({ state: "ready", questions: [] });
  expect(files[0]).toMatchObject({
    name: "July.xlsx – Log",
    source: { kind: "xlsx", member: "Log" },
    recognition: { dataRowCount: 25 },
  });
  expect(checks?.files[0]?.firstInstant).toBe("2025-07-14T06:00:00.000Z");
  const [step] = (checks?.files[0]?.steps ?? []).filter(({ code }) => code === "unreadableCells");
  // The header is row 2, so the eighth reading is row 10 of the sheet.
  expect(step).toMatchObject({ count: 1, examples: [{ line: 10, cell: "broken" }] });
  const shown = await agent.get(`/imports/${id}/files/${files[0]?.id}/rows?line=10&limit=1`);
  expect(shown.body.rows).toEqual([
    { line: 10, cells: ["2025-07-14T06:35:00", "broken", "6.9", "12.8"] },
  ]);
});

test("an archive with more logs than an import takes names them and stores none", async () => {
  const { agent, id } = await start();
  const parts = Object.fromEntries(
    Array.from({ length: 13 }, (_, i) => [`day-${i}.csv`, log(`${20 + i}.00`)]),
  );
  await upload(agent, id, await zipOf(parts), "all.zip");
  const { files, state } = await read(agent, id);
  expect(state).toBe("asking");
  expect(files).toHaveLength(1);
  expect(files[0]?.unreadable).toMatchObject({
    code: "archiveTooManyFiles",
    cell: expect.stringContaining("day-0.csv, day-1.csv"),
  });
  const refused = await agent.get(`/imports/${id}/files/${files[0]?.id}/text`).expect(409);
  expect(refused.body.code).toBe("file-not-unpacked");
});

test("the same sheet of the same upload is known again where it is stored already", async () => {
  const { agent, id, point } = await start();
  const bytes = await zipOf({ "flow.csv": log() });
  await upload(agent, id, bytes, "visit.zip");
  await agent.post(`/imports/${id}/confirm`).expect(202);
  await runJobs(app);
  const next = (await agent.post(`/points/${point.id}/imports`).expect(201)).body as ImportDetail;
  await upload(agent, next.id, Buffer.from(log()), "flow.csv");
  expect((await read(agent, next.id)).files[0]?.sameAs).toMatchObject({ importId: id });
});
