import { execFile } from "node:child_process";
import { cpSync, mkdtempSync, readFileSync, rmSync } from "node:fs";
import os from "node:os";
import path from "node:path";
import { promisify } from "node:util";
import type { EnergyAnswer } from "@shared/contracts/energy";
import { bootApplication, type Application } from "@test/e2e/harness/application";
import { emailOf, foundOrganisation, password } from "@test/e2e/harness/people";
import { docsFolder, exampleRows, guideScript } from "./guide";
import { independentCoolingKwh } from "./independent-energy";

const run = promisify(execFile);

let application: Application;
let folder: string;

beforeAll(async () => {
  application = await bootApplication();
  await foundOrganisation(application);
  folder = mkdtempSync(path.join(os.tmpdir(), "loopwright-guide-"));
  cpSync(path.join(docsFolder, "examples"), path.join(folder, "examples"), { recursive: true });
}, 180_000);

afterAll(async () => {
  await application?.stop();
  rmSync(folder, { recursive: true, force: true });
}, 60_000);

const answer = (name: string) =>
  JSON.parse(readFileSync(path.join(folder, name), "utf8")) as EnergyAnswer;
const sum = (values: readonly (number | null)[] | undefined) =>
  (values ?? []).reduce<number>((total, value) => total + (value ?? 0), 0);

it("the lines of the API guide bring two files to the energy they hold", async () => {
  const { stdout } = await run("sh", ["-c", guideScript()], {
    cwd: folder,
    env: {
      ...process.env,
      API: `${application.address}/api/v1`,
      EMAIL: emailOf("administrator"),
      PASSWORD: password,
    },
    timeout: 60_000,
  });
  expect(stdout).toContain("flow.csv: flowUnit");
  expect(stdout).toContain("temperatures.csv: loggerClock");

  const flow = exampleRows("flow.csv");
  const temperatures = exampleRows("temperatures.csv");
  const instantMs = temperatures.map(({ atMs }) => atMs);
  // The loop's pressure: 0.4 MPa on the gauge and an atmosphere. 1 L/s is 3.6 m³/h.
  const expected = independentCoolingKwh(
    {
      flow: {
        instantMs: flow.map(({ atMs }) => atMs),
        values: flow.map(({ values }) => (values[0] ?? NaN) * 3.6),
      },
      flowStepMs: 300_000,
      supply: { instantMs, values: temperatures.map(({ values }) => values[0] ?? NaN) },
      return: { instantMs, values: temperatures.map(({ values }) => values[1] ?? NaN) },
      temperatureStepMs: 600_000,
    },
    0.501325,
  );
  const total = answer("total.json");
  const coolingKwh = total.totals.cooling.energyKwh ?? NaN;
  expect(Math.abs(coolingKwh / expected - 1)).toBeLessThan(5e-4);
  expect(total.totals.heating.energyKwh).toBe(0);
  expect(total.totals.coverage).toBeCloseTo(1, 6);
  for (const [name, rows] of [
    ["day.json", 1],
    ["hour.json", 24],
  ] as const) {
    const { columns } = answer(name);
    expect(columns?.startMs).toHaveLength(rows);
    expect(sum(columns?.coolingKwh)).toBeCloseTo(coolingKwh, 2);
  }
  expect(answer("quarter-hours.json").columns?.startMs).toHaveLength(16);
}, 120_000);
