import type { FileFact, ImportDetail } from "@shared/contracts/imports";
import { BoreVersion } from "@server/models/bore-version";
import { evidenceOfPoint, instrument } from "@server/testing/evidence-factories";
import { signedIn } from "@server/testing/factories";
import { pointToMeter } from "@server/testing/place-factories";
import { runJobs } from "@server/testing/run-jobs";
import { testApp } from "@server/testing/test-app";

const app = testApp();

/** Five minutes apart from 1 March 2026, which the factories' installation speaks for. */
function log(preamble: readonly string[]): string {
  const rows = Array.from({ length: 13 }, (_, i) => {
    const at = new Date(Date.UTC(2026, 2, 1, 6) + i * 300_000).toISOString();
    return `${at},28.80,6.90,12.80`;
  });
  return [...preamble, "time,flow m3/h,supply °C,return °C", ...rows, ""].join("\n");
}

async function factsOf(preamble: (serial: string) => readonly string[], record: boolean) {
  const agent = await signedIn(app, { role: "surveyor" });
  const { organisationId } = agent;
  const { point } = await pointToMeter(app, organisationId);
  await BoreVersion.create({
    organisationId,
    pointId: point.id,
    validFrom: new Date("2026-01-01T00:00:00Z"),
    kind: "measured",
    outsideDiameterMm: 88.9,
    wallMm: 3.2,
    liningMm: 0,
    insideDiameterMm: 82.5,
  });
  const serial = record
    ? (await evidenceOfPoint(app, organisationId, point.id)).meter.serial
    : (await instrument(app, organisationId, "flowMeter")).serial;
  const { id } = (await agent.post(`/points/${point.id}/imports`).expect(201)).body as ImportDetail;
  await agent
    .post(`/imports/${id}/files`)
    .attach("file", Buffer.from(log(preamble(serial))), "log.csv")
    .expect(201);
  await runJobs(app);
  const detail = (await agent.get(`/imports/${id}`).expect(200)).body as ImportDetail;
  const facts = detail.files[0]?.facts ?? [];
  return { fact: (kind: FileFact["kind"]) => facts.find((fact) => fact.kind === kind) };
}

test("serials and bore above the header are held against the installation of that time", async () => {
  const { fact } = await factsOf(
    (serial) => [`Serial,${serial}`, "Pipe inside diameter,41 mm", "Interval,5 min", "Wall,3 mm"],
    true,
  );
  expect(fact("serial")).toMatchObject({ verdict: "matches", line: 1, weight: null });
  expect(fact("intervalS")).toMatchObject({ verdict: "matches", value: 300, recorded: 300 });
  expect(fact("wallMm")).toMatchObject({ verdict: "notRecorded", value: 3 });
  expect(fact("boreMm")).toMatchObject({
    verdict: "differs",
    value: 41,
    recorded: 82.5,
    weight: "stop",
  });
});

test("another serial than the installation's is worth a look; without a record it can be taken over", async () => {
  const other = await factsOf(() => ["Serial,ZZ-9"], true);
  expect(other.fact("serial")).toMatchObject({ verdict: "differs", weight: "look" });
  const unrecorded = await factsOf((serial) => [`Serial,${serial}`], false);
  expect(unrecorded.fact("serial")).toMatchObject({ verdict: "notRecorded", recorded: null });
});
