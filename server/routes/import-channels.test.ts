import type { ImportDetail } from "@shared/contracts/imports";
import type { FileRecipe } from "@shared/domain/log-files/recipe";
import { unpackNumbers } from "@shared/domain/readings/packed-numbers";
import { BoreVersion } from "@server/models/bore-version";
import { MeteringPoint } from "@server/models/metering-point";
import { loadSegments, loadSources } from "@server/readings/load-segments";
import { signedIn } from "@server/testing/factories";
import { importSteps } from "@server/testing/import-steps";
import { pointToMeter } from "@server/testing/place-factories";
import { runJobs } from "@server/testing/run-jobs";
import { testApp } from "@server/testing/test-app";

const app = testApp();
const { read, uploaded, answered, stored } = importSteps(app);

const startMs = Date.UTC(2025, 4, 18);
const quarterMs = 900_000;

const codes = (detail: ImportDetail) => detail.files[0]?.questions.map(({ code }) => code);
const stepOf = (detail: ImportDetail, code: string) =>
  detail.checks?.files[0]?.steps.find((step) => step.code === code);

/** Quarter-hours of UTC with the cells of each row. */
function logOf(header: string, rows: readonly (readonly (number | string)[])[]): string {
  const lines = rows.map((cells, i) =>
    [new Date(startMs + i * quarterMs).toISOString(), ...cells].join(";"),
  );
  return [`Time (UTC);${header}`, ...lines, ""].join("\n");
}

const readingsOf = (pointId: string) =>
  loadSegments(app.database, pointId, startMs - quarterMs, startMs + 86_400_000);

function givePipe(organisationId: string, pointId: string, insideDiameterMm: number, from: Date) {
  return BoreVersion.create({
    organisationId,
    pointId,
    validFrom: from,
    kind: "measured",
    outsideDiameterMm: 114.3,
    wallMm: (114.3 - insideDiameterMm) / 2,
    liningMm: 0,
    insideDiameterMm,
  });
}

describe("a log of water speed", () => {
  const speeds = logOf("Velocity (m/s);Supply (°C);Return (°C)", [
    [1, 6.5, 12],
    [0.5, 6.5, 12],
    ["OL", 6.5, 12],
    [-0.25, 6.5, 12],
  ]);

  test("waits for the point's pipe, then becomes flow by its bore, as a step of its own", async () => {
    const agent = await signedIn(app, { role: "surveyor" });
    const { point } = await pointToMeter(app, agent.organisationId);
    const asking = await uploaded(agent, point.id, speeds);
    expect(asking.state).toBe("asking");
    expect(codes(asking)).toEqual(["pointBore"]);
    expect(codes(await answered(agent, asking))).toEqual(["pointBore"]);

    // Entered after the log was written: the first pipe known speaks for the time before it.
    await givePipe(agent.organisationId, point.id, 102.26, app.clock.date());
    const ready = await answered(agent, asking);
    expect(codes(ready)).toEqual([]);
    expect(stepOf(ready, "velocityTimesBore")).toMatchObject({
      count: 3,
      countByKind: { "102.26 mm": 3 },
    });
    await stored(agent, ready);
    const [segment] = await readingsOf(point.id);
    // 1 m/s in NPS 4 schedule 40 is 29.5668 m³/h.
    const flows = [...segment!.columns.flowM3PerHour!].map((flow) => Math.round(flow * 1e4) / 1e4);
    expect(flows).toEqual([29.5668, 14.7834, NaN, -7.3917]);
  });

  test("takes each row's bore from the version of its time", async () => {
    const agent = await signedIn(app, { role: "surveyor" });
    const { point } = await pointToMeter(app, agent.organisationId);
    const change = new Date(startMs + quarterMs);
    const first = await givePipe(agent.organisationId, point.id, 100, new Date(startMs - 1));
    await first.update({ validTo: change });
    await givePipe(agent.organisationId, point.id, 50, change);
    const ready = await uploaded(agent, point.id, speeds);
    expect(stepOf(ready, "velocityTimesBore")?.countByKind).toEqual({ "100 mm": 1, "50 mm": 2 });
    expect(stepOf(ready, "velocityTimesBore")?.examples[1]?.cell).toBe("0.5 m/s");
  });

  test("beside a flow rate is left out, and both together are refused", async () => {
    const agent = await signedIn(app, { role: "surveyor" });
    const { point } = await pointToMeter(app, agent.organisationId);
    const both = logOf("Flow (m³/h);Velocity (ft/s)", [
      [20, 2],
      [21, 2],
    ]);
    const detail = await uploaded(agent, point.id, both);
    const [file] = detail.files;
    expect(file?.recipe?.columns.map(({ meaning }) => meaning)).toEqual(["time", "flow", "skip"]);
    const recipe = {
      ...file!.recipe!,
      columns: file!.recipe!.columns.map((column) =>
        column.index === 2 ? { ...column, meaning: "velocity", unit: "ft/s" } : column,
      ),
    };
    const refused = await agent
      .put(`/imports/${detail.id}/files/${file!.id}/recipe`)
      .send(recipe)
      .expect(422);
    expect(JSON.stringify(refused.body)).toContain("two-flows");
  });
});

describe("a log of pulses", () => {
  const pulses = logOf("Pulses;Supply (°C);Return (°C)", [
    [3, 6.5, 12],
    [12, 6.5, 12],
    [7, 6.5, 12],
  ]);

  test("asks what a pulse stands for, and says what the first step loses", async () => {
    const agent = await signedIn(app, { role: "surveyor" });
    const { point } = await pointToMeter(app, agent.organisationId);
    const asking = await uploaded(agent, point.id, pulses);
    expect(codes(asking)).toEqual(["pulseValue"]);
    expect(asking.files[0]?.recipe).toMatchObject({ seriesKind: "meanToLabel" });
    const worth = (given: object) => (recipe: FileRecipe) => ({
      ...recipe,
      columns: recipe.columns.map((column) =>
        column.meaning === "pulses" ? { ...column, ...given } : column,
      ),
    });
    // A unit alone is no worth, and neither is a number.
    expect(codes(await answered(agent, asking, worth({ unit: "L" })))).toEqual(["pulseValue"]);
    expect(codes(await answered(agent, asking, worth({ pulseValue: 10 })))).toEqual(["pulseValue"]);
    const ready = await answered(agent, asking, worth({ unit: "L", pulseValue: 10 }));
    expect(stepOf(ready, "pulsesToFlow")).toMatchObject({ count: 2, countByKind: { "10 L": 2 } });
    expect(stepOf(ready, "pulseOpening")).toMatchObject({ count: 1, countByKind: { first: 1 } });
    // 12 and 7 pulses of 10 L are 0.19 m³.
    expect(ready.checks?.energy?.volumeM3).toBeCloseTo(0.19, 9);
    await stored(agent, ready);
    const [segment] = await readingsOf(point.id);
    expect([...segment!.columns.flowM3PerHour!]).toEqual([NaN, 0.12 * 4, 0.07 * 4]);
  });
});

test("rows whose status somebody calls bad are left out, and come back when it is called good", async () => {
  const agent = await signedIn(app, { role: "surveyor" });
  const { point } = await pointToMeter(app, agent.organisationId);
  const text = logOf("Flow (m³/h);Supply (°C);Return (°C);Status", [
    [20, 6.5, 12, "OK"],
    [21, 6.5, 12, "Fehler"],
    [22, 6.5, 12, "OK"],
    [23, 6.5, 12, "Air in pipe"],
  ]);
  const asking = await uploaded(agent, point.id, text);
  expect(asking.files[0]?.questions).toEqual([
    {
      code: "statusWords",
      columnIndex: 4,
      words: [
        { word: "OK", count: 2, likely: "good" },
        { word: "Air in pipe", count: 1, likely: null },
        { word: "Fehler", count: 1, likely: "bad" },
      ],
    },
  ]);
  const bad = (badWords: readonly string[]) => (recipe: FileRecipe) => ({
    ...recipe,
    columns: recipe.columns.map((column) =>
      column.meaning === "status" ? { ...column, badWords } : column,
    ),
  });
  const ready = await answered(agent, asking, bad(["Fehler", "Air in pipe"]));
  expect(ready.checks?.rows).toMatchObject({ measured: 2, excluded: 2 });
  expect(stepOf(ready, "badStatus")?.countByKind).toEqual({ Fehler: 1, "Air in pipe": 1 });
  const kept = await answered(agent, ready, bad([]));
  expect(kept.checks?.rows).toMatchObject({ measured: 4, excluded: 0 });
  expect(stepOf(kept, "badStatus")).toBeUndefined();
});

describe("companion series", () => {
  test("of a log are stored beside its readings and change no energy", async () => {
    const agent = await signedIn(app, { role: "surveyor" });
    const { point } = await pointToMeter(app, agent.organisationId);
    const { point: bare } = await pointToMeter(app, agent.organisationId);
    const rows = [
      [20, 6.5, 12],
      [21, 6.5, 12],
      [22, 6.5, 12],
    ];
    const alone = await uploaded(
      agent,
      bare.id,
      logOf("Flow (m³/h);Supply (°C);Return (°C)", rows),
    );
    const ready = await uploaded(
      agent,
      point.id,
      logOf(
        "Flow (m³/h);Supply (°C);Return (°C);Outdoor temp (°F);Pump power (W);Pressure (bar)",
        rows.map((row, i) => [...row, 59 + i, 700, i === 1 ? "" : 2.5]),
      ),
    );
    expect(ready.files[0]?.recipe?.columns.slice(4).map(({ meaning }) => meaning)).toEqual([
      "outdoor",
      "electricPower",
      "pressure",
    ]);
    expect(ready.checks?.rows.measured).toBe(3);
    expect(ready.checks?.energy?.coolingKwh).toBeGreaterThan(1);
    expect(ready.checks?.energy).toEqual(alone.checks?.energy);
    await stored(agent, ready);
    const [source] = await loadSources(app.database, point.id, startMs, startMs + 86_400_000);
    const { outdoorC, electricKw, pressureKpa } = source!.columns;
    expect([...outdoorC!].map((value) => Math.round(value * 1e6) / 1e6)).toEqual([
      15, 15.555556, 16.111111,
    ]);
    expect(electricKw?.[2]).toBeCloseTo(0.7, 12);
    expect([...pressureKpa!]).toEqual([250, NaN, 250]);

    const csv = await agent
      .get(`/points/${point.id}/readings.csv?from=2025-05-18&to=2025-05-19`)
      .expect(200);
    const [header, first, second] = csv.text.trim().split(/\r?\n/);
    expect(header).toMatch(/Quality,Outdoor \(degC\),Electric power \(kW\),Pressure \(kPa\)$/);
    expect(first).toMatch(/measured,15(\.0+)?,0\.70*,250(\.0+)?$/);
    // Between two readings no more than two steps apart the line is taken, as for temperatures.
    expect(second).toMatch(/measured,15\.5556,0\.70*,250(\.0+)?$/);
    const listed = await agent.get(`/points/${point.id}/companions`).expect(200);
    expect(listed.body.items).toEqual(
      ["outdoor", "electricPower", "pressure"].map((channel) => ({
        channel,
        firstAt: new Date(startMs).toISOString(),
        lastAt: new Date(startMs + 2 * quarterMs).toISOString(),
        rows: 3,
        files: 1,
      })),
    );
    const series = await agent
      .get(
        `/points/${point.id}/companions/pressure/series?from=2025-05-18&to=2025-05-19&pixels=400`,
      )
      .expect(200);
    expect(series.body).toMatchObject({ rows: 2, averagedOverS: null, least: 250, greatest: 250 });
    expect(unpackNumbers(series.body.values)).toEqual(Float64Array.of(250, NaN, 250));
  });

  test("may come alone, and then say nothing of the point's flow or span", async () => {
    const agent = await signedIn(app, { role: "surveyor" });
    const { point } = await pointToMeter(app, agent.organisationId);
    const detail = await uploaded(
      agent,
      point.id,
      logOf("Außentemperatur (°C)", [[14.5], [14.7], ["---"]]),
    );
    expect(codes(detail)).toEqual([]);
    expect(detail.state).toBe("ready");
    expect(detail.checks).toMatchObject({ rows: { measured: 3, missing: 0 }, energy: null });
    const done = await stored(agent, detail);
    expect(done).toMatchObject({ state: "imported", rowsStored: 3 });
    expect(await readingsOf(point.id)).toEqual([]);
    const summary = await agent
      .get(`/points/${point.id}/summary?from=2025-05-18&to=2025-05-19`)
      .expect(200);
    expect(summary.body).toMatchObject({ firstReadingAt: null, lastReadingAt: null });
  });
});

describe("a file with the columns of two points", () => {
  const text = logOf(
    "North flow (m³/h);North supply (°C);North return (°C);South flow (m³/h);South supply (°C);South return (°C)",
    [
      [20, 6.5, 12, 40, 7, 11],
      [21, 6.5, 12, 41, 7, 11],
      [22, 6.5, 12, 42, 7, 11],
    ],
  );
  const useSet = (detail: ImportDetail, name: string) => (recipe: FileRecipe) => {
    const set = detail.files[0]!.recognition!.pointSets.find((other) => other.name === name)!;
    return {
      ...recipe,
      columns: recipe.columns.map((column) => ({
        ...column,
        ...set.columns.find(({ index }) => index === column.index),
      })),
    };
  };

  test("asks which are this point's, and serves the other point without another upload", async () => {
    const agent = await signedIn(app, { role: "surveyor" });
    const { point, loop } = await pointToMeter(app, agent.organisationId);
    const south = await MeteringPoint.create({
      organisationId: agent.organisationId,
      loopId: loop.id,
      code: "P-south",
      name: "South riser",
      role: "riser",
      meterSide: "return",
      createdAt: app.clock.date(),
    });
    const asking = await uploaded(agent, point.id, text);
    expect(codes(asking)).toEqual(["whichSet"]);
    expect(asking.files[0]?.recognition?.pointSets.map(({ name }) => name)).toEqual([
      "north",
      "south",
    ]);
    const ready = await answered(agent, asking, useSet(asking, "north"));
    expect(ready.state).toBe("ready");
    await stored(agent, ready);

    const opened = await agent
      .post(`/imports/${ready.id}/files/${ready.files[0]!.id}/also`)
      .send({ pointId: south.id })
      .expect(201);
    await runJobs(app);
    const also = await read(agent, (opened.body as ImportDetail).id);
    const [file] = also.files;
    expect(also).toMatchObject({ state: "ready", point: { id: south.id } });
    expect(file).toMatchObject({ sha256: ready.files[0]!.sha256, sameAs: null, questions: [] });
    expect(file?.recipe?.columns.slice(1).map(({ meaning }) => meaning)).toEqual([
      "skip",
      "skip",
      "skip",
      "flow",
      "supply",
      "return",
    ]);
    expect(file?.alsoFor).toMatchObject([{ importId: ready.id, sameColumns: [] }]);
    await stored(agent, also);
    const [segment] = await readingsOf(south.id);
    expect([...segment!.columns.flowM3PerHour!]).toEqual([40, 41, 42]);

    // Each point's import is undone by itself.
    await agent.post(`/imports/${also.id}/undo`).expect(202);
    await runJobs(app);
    expect(await readingsOf(south.id)).toEqual([]);
    expect(await readingsOf(point.id)).toHaveLength(1);
  });

  test("warns where two points read the same columns", async () => {
    const agent = await signedIn(app, { role: "surveyor" });
    const { point } = await pointToMeter(app, agent.organisationId);
    const { point: other } = await pointToMeter(app, agent.organisationId);
    const first = await uploaded(agent, point.id, text);
    await answered(agent, first, useSet(first, "north"));
    const second = await uploaded(agent, other.id, text);
    const detail = await answered(agent, second, useSet(second, "north"));
    expect(detail.files[0]?.alsoFor).toMatchObject([
      { importId: first.id, point: { id: point.id }, sameColumns: [1, 2, 3] },
    ]);
    // Of another site: its own upload is right, the shortcut is not.
    await agent
      .post(`/imports/${first.id}/files/${first.files[0]!.id}/also`)
      .send({ pointId: other.id })
      .expect(409);
  });
});

test("two columns of one name are asked about, in whichever order they stand", async () => {
  const agent = await signedIn(app, { role: "surveyor" });
  const { point } = await pointToMeter(app, agent.organisationId);
  const asking = await uploaded(
    agent,
    point.id,
    logOf("Flow (m³/h);T (°C);T (°C)", [
      [20, 12, 6.5],
      [21, 12, 6.5],
    ]),
  );
  expect(codes(asking)).toEqual(["alikeColumns"]);
  // Another answer leaves the question open.
  expect(codes(await answered(agent, asking))).toEqual(["alikeColumns"]);
  const ready = await answered(agent, asking, (recipe) => ({
    ...recipe,
    columns: recipe.columns.map((column) =>
      column.index < 2
        ? column
        : { ...column, meaning: column.index === 3 ? "supply" : "return", unit: "degC" },
    ),
  }));
  expect(ready.state).toBe("ready");
  expect(ready.checks?.energy?.coolingKwh).toBeGreaterThan(1);
});
