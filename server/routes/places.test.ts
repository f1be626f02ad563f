import { QueryTypes } from "sequelize";
import type { Loop, Point, Site } from "@shared/contracts/places";
import { AuditEvent } from "@server/models/audit-event";
import { signedIn, type Agent } from "@server/testing/factories";
import { testApp } from "@server/testing/test-app";

const app = testApp();

const quay = { name: "Quay Works", zone: "Europe/London", currency: "GBP" };
const chilled = { tag: "CHW-1", name: "Chilled water", service: "chilled" };

async function makeSite(agent: Agent, fields: object = {}): Promise<Site> {
  return (await agent.post("/sites", { ...quay, ...fields }).expect(201)).body;
}
async function makeLoop(agent: Agent, siteId: string, fields: object = {}): Promise<Loop> {
  const body = { ...chilled, ...fields };
  return (await agent.post(`/sites/${siteId}/loops`, body).expect(201)).body;
}
async function makePoint(agent: Agent, loopId: string, fields: object = {}): Promise<Point> {
  const body = { code: "P1", name: "Main", role: "main", meterSide: "return", ...fields };
  return (await agent.post(`/loops/${loopId}/points`, body).expect(201)).body;
}

/** As an import leaves it behind: readings and a file that hang on the point. */
async function giveReadings(agent: Agent, pointId: string, rowCount = 10): Promise<void> {
  const replacements = { organisationId: agent.organisationId, pointId, rowCount };
  await app.database.query(
    `INSERT INTO log_import (organisation_id, point_id, state, repair, created_by_name, created_at)
     VALUES (:organisationId, :pointId, 'imported', '{}', 'Test', '2026-03-01')`,
    { replacements },
  );
  await app.database.query(
    `INSERT INTO point_readings (point_id, organisation_id, revision, zone, row_count, first_ms,
       last_ms, engine_version, calculated_at)
     VALUES (:pointId, :organisationId, 1, 'Europe/London', :rowCount, 1772323200000,
       1772409600000, 1, '2026-03-02')`,
    { replacements },
  );
}

describe("sites", () => {
  test("a new site has the fields given and SI units unless chosen", async () => {
    const engineer = await signedIn(app);
    const site = await makeSite(engineer);
    expect(site).toMatchObject({
      ...quay,
      unitSystem: "si",
      address: null,
      isDemo: false,
      archivedAt: null,
      loopCount: 0,
      can: { edit: true, remove: true, addLoop: true, import: true },
    });
  });

  test("a name cannot carry lines of its own into letters and CSV files", async () => {
    const engineer = await signedIn(app);
    for (const name of ["Quay\r\nBcc: all", "Quay\u0000", "Quay\u0085"]) {
      const answer = await engineer.post("/sites", { ...quay, name });
      expect([name, answer.status]).toEqual([name, 422]);
    }
    await makeSite(engineer, { name: "Kai Süd · 東 ✓" });
  });

  test("a zone the world does not know is refused at its field", async () => {
    const engineer = await signedIn(app);
    const answer = await engineer.post("/sites", { ...quay, zone: "Europe/Atlantis" });
    expect(answer.status).toBe(422);
    expect(answer.body.errors).toEqual([expect.objectContaining({ pointer: "/body/zone" })]);
  });

  test("a surveyor sees sites but does not change them; a tenant contact sees none", async () => {
    const surveyor = await signedIn(app, { role: "surveyor" });
    const { organisationId } = surveyor;
    const engineer = await signedIn(app, { organisationId });
    const site = await makeSite(engineer);
    const seen = await surveyor.get(`/sites/${site.id}`).expect(200);
    expect(seen.body.can).toMatchObject({ edit: false, addLoop: false, import: true });
    await surveyor.patch(`/sites/${site.id}`, { name: "Mine" }).expect(403);
    const tenant = await signedIn(app, { role: "tenantContact", organisationId });
    await tenant.get("/sites").expect(403);
  });

  test("pages go through all sites by name without losing or repeating one", async () => {
    const engineer = await signedIn(app);
    for (const name of ["Dock", "Basin", "Dock", "Arches"]) await makeSite(engineer, { name });
    const seen: string[] = [];
    let cursor: string | null = "";
    while (cursor !== null) {
      const more: string = cursor === "" ? "" : `&cursor=${cursor}`;
      const { body } = await engineer.get(`/sites?limit=2${more}`).expect(200);
      seen.push(...body.items.map((site: Site) => site.name));
      cursor = body.nextCursor;
    }
    expect(seen).toEqual(["Arches", "Basin", "Dock", "Dock"]);
    await engineer.get("/sites?cursor=bm9uc2Vuc2U").expect(422);
  });

  test("an archived site leaves the list, takes nothing new, and comes back", async () => {
    const engineer = await signedIn(app);
    const site = await makeSite(engineer);
    const away = await engineer.patch(`/sites/${site.id}`, { archived: true }).expect(200);
    expect(away.body.archivedAt).toBe(app.clock.date().toISOString());
    expect((await engineer.get("/sites")).body.items).toEqual([]);
    expect((await engineer.get("/sites?archived=false")).body.items).toEqual([]);
    expect((await engineer.get("/sites?archived=true")).body.items).toHaveLength(1);
    const refused = await engineer.post(`/sites/${site.id}/loops`, chilled).expect(409);
    expect(refused.body).toMatchObject({
      code: "site-archived",
      remedy: "Restore the site first.",
    });
    await engineer.patch(`/sites/${site.id}`, { archived: false }).expect(200);
    expect((await engineer.get("/sites")).body.items).toHaveLength(1);
  });

  test("a site that holds readings offers archiving instead of removal", async () => {
    const engineer = await signedIn(app);
    const site = await makeSite(engineer);
    const loop = await makeLoop(engineer, site.id);
    const point = await makePoint(engineer, loop.id);
    await giveReadings(engineer, point.id);
    for (const path of [`/sites/${site.id}`, `/loops/${loop.id}`, `/points/${point.id}`]) {
      expect((await engineer.get(path)).body.can).toMatchObject({ remove: false, archive: true });
      const refused = await engineer.delete(path).expect(409);
      expect(refused.body.code).toBe("holds-readings");
      expect(refused.body.remedy).toContain("Archive it instead");
    }
    expect((await engineer.get(`/loops/${loop.id}`)).body.hasReadings).toBe(true);
  });

  test("removing a site without readings takes its loops, points and pipes along", async () => {
    const engineer = await signedIn(app);
    const site = await makeSite(engineer);
    await engineer.post(`/sites/${site.id}/buildings`, { name: "Shed" }).expect(201);
    const main = await makeLoop(engineer, site.id);
    const loop = await makeLoop(engineer, site.id, { tag: "CHW-2", parentLoopId: main.id });
    const top = await makePoint(engineer, loop.id);
    const pipe = { kind: "table", tableId: "asme-b36.10m-40", dn: 100 };
    await makePoint(engineer, loop.id, { code: "P2", role: "branch", parentPointId: top.id, pipe });
    await engineer.delete(`/sites/${site.id}`).expect(200);
    await engineer.get(`/sites/${site.id}`).expect(404);
    await engineer.get(`/points/${top.id}`).expect(404);
  });

  test("each change is on record with what was before", async () => {
    const engineer = await signedIn(app);
    const site = await makeSite(engineer);
    await engineer.patch(`/sites/${site.id}`, { name: "Quay North", currency: "GBP" }).expect(200);
    const events = await AuditEvent.findAll({
      where: { organisationId: engineer.organisationId, subjectKind: "site" },
      order: [["id", "ASC"]],
    });
    expect(events.map((event) => event.kind)).toEqual(["site-created", "site-updated"]);
    expect(events[1]?.details).toEqual({ name: { from: "Quay Works", to: "Quay North" } });
  });
});

describe("buildings", () => {
  test("a building keeps its loops: it can be archived, not removed, while one stands in it", async () => {
    const engineer = await signedIn(app);
    const site = await makeSite(engineer);
    const { body: shed } = await engineer.post(`/sites/${site.id}/buildings`, { name: "Shed" });
    const loop = await makeLoop(engineer, site.id, { buildingId: shed.id });
    const refused = await engineer.delete(`/buildings/${shed.id}`).expect(409);
    expect(refused.body.detail).toContain("CHW-1");
    await engineer.patch(`/loops/${loop.id}`, { buildingId: null }).expect(200);
    await engineer.delete(`/buildings/${shed.id}`).expect(200);
  });

  test("two buildings of a site in use cannot share a name", async () => {
    const engineer = await signedIn(app);
    const site = await makeSite(engineer);
    const path = `/sites/${site.id}/buildings`;
    const { body: first } = await engineer.post(path, { name: "Shed" }).expect(201);
    const twice = await engineer.post(path, { name: "Shed" }).expect(422);
    expect(twice.body.errors[0].pointer).toBe("/body/name");
    await engineer.patch(`/buildings/${first.id}`, { archived: true }).expect(200);
    await engineer.post(path, { name: "Shed" }).expect(201);
    const back = await engineer.patch(`/buildings/${first.id}`, { archived: false }).expect(409);
    expect(back.body).toMatchObject({ code: "name-taken" });
  });
});

describe("loops", () => {
  test("a blank gauge pressure means 1.6 MPa absolute, shown as assumed", async () => {
    const engineer = await signedIn(app);
    const site = await makeSite(engineer);
    const loop = await makeLoop(engineer, site.id);
    expect(loop.pressure).toEqual({ absoluteMPa: 1.6, assumed: true });
    const { body } = await engineer.patch(`/loops/${loop.id}`, { gaugePressureMPa: 0.4 });
    expect(body.pressure.assumed).toBe(false);
    // One standard atmosphere on top of the gauge: 0.101325 MPa.
    expect(body.pressure.absoluteMPa).toBeCloseTo(0.501325, 9);
  });

  test("a glycol loop keeps when and how it was tested, gives energy, and turns to water again", async () => {
    const engineer = await signedIn(app);
    const site = await makeSite(engineer);
    const fluid = { kind: "propyleneGlycol", percent: 30, basis: "mass" };
    const loop = await makeLoop(engineer, site.id, { fluid });
    expect(loop).toMatchObject({
      fluid: { ...fluid, testedOn: null, testMethod: null },
      energyBlockedBy: null,
    });
    const tested = { ...fluid, testedOn: "2026-03-02", testMethod: "refractometer" };
    await engineer.patch(`/loops/${loop.id}`, { fluid: tested }).expect(200);
    const { body: kept } = await engineer.get(`/loops/${loop.id}`);
    expect(kept.fluid).toEqual(tested);
    const { body } = await engineer.patch(`/loops/${loop.id}`, { fluid: { kind: "water" } });
    expect(body).toMatchObject({ fluid: { kind: "water" }, energyBlockedBy: null });
  });

  test("a tag is unique among the site's loops in use", async () => {
    const engineer = await signedIn(app);
    const site = await makeSite(engineer);
    const other = await makeSite(engineer);
    await makeLoop(engineer, site.id);
    await makeLoop(engineer, other.id);
    const twice = await engineer.post(`/sites/${site.id}/loops`, chilled).expect(422);
    expect(twice.body.errors).toEqual([
      expect.objectContaining({ pointer: "/body/tag", code: "tag-taken" }),
    ]);
  });

  test("a feeding loop is of the same site and never fed by what it feeds", async () => {
    const engineer = await signedIn(app);
    const site = await makeSite(engineer);
    const other = await makeSite(engineer);
    const stranger = await makeLoop(engineer, other.id);
    const a = await makeLoop(engineer, site.id, { tag: "A" });
    const b = await makeLoop(engineer, site.id, { tag: "B", parentLoopId: a.id });
    const c = await makeLoop(engineer, site.id, { tag: "C", parentLoopId: b.id });
    for (const parentLoopId of [stranger.id, a.id, c.id]) {
      const refused = await engineer.patch(`/loops/${a.id}`, { parentLoopId }).expect(422);
      expect(refused.body.errors[0].pointer).toBe("/body/parentLoopId");
    }
    const feeding = await engineer.delete(`/loops/${a.id}`).expect(409);
    expect(feeding.body).toMatchObject({ code: "feeds-loops", detail: "A feeds B." });
  });

  test("a cut-off at the design flow would hide everything and is refused", async () => {
    const engineer = await signedIn(app);
    const site = await makeSite(engineer);
    const body = { ...chilled, designFlowM3PerHour: 30, flowCutOffM3PerHour: 30 };
    const refused = await engineer.post(`/sites/${site.id}/loops`, body).expect(422);
    expect(refused.body.errors[0].pointer).toBe("/body/flowCutOffM3PerHour");
  });

  test("another pressure asks for the stored energy to be worked out again", async () => {
    const engineer = await signedIn(app);
    const site = await makeSite(engineer);
    const loop = await makeLoop(engineer, site.id);
    const point = await makePoint(engineer, loop.id);
    await giveReadings(engineer, point.id);
    const jobs = async () =>
      app.database.query("SELECT kind FROM job WHERE point_id = :pointId", {
        replacements: { pointId: point.id },
        type: QueryTypes.SELECT,
      });
    await engineer.patch(`/loops/${loop.id}`, { name: "Renamed", notes: "Seen" }).expect(200);
    expect(await jobs()).toEqual([]);
    await engineer.patch(`/loops/${loop.id}`, { gaugePressureMPa: 0.3 }).expect(200);
    expect(await jobs()).toEqual([{ kind: "recalculate" }]);
  });
});

describe("metering points", () => {
  test("the meter side has no default", async () => {
    const surveyor = await signedIn(app, { role: "surveyor" });
    const { organisationId } = surveyor;
    const engineer = await signedIn(app, { organisationId });
    const loop = await makeLoop(engineer, (await makeSite(engineer)).id);
    const body = { code: "P1", name: "Main", role: "main" };
    const refused = await surveyor.post(`/loops/${loop.id}/points`, body).expect(422);
    expect(refused.body.errors).toEqual([expect.objectContaining({ pointer: "/body/meterSide" })]);
    await makePoint(surveyor, loop.id);
  });

  test("a pipe by table brings its bore, and one that does not exist is refused", async () => {
    const engineer = await signedIn(app);
    const loop = await makeLoop(engineer, (await makeSite(engineer)).id);
    const pipe = { kind: "table", tableId: "asme-b36.10m-40", dn: 100 };
    const point = await makePoint(engineer, loop.id, { pipe });
    // ASME B36.10M, NPS 4 schedule 40.
    expect(point).toMatchObject({
      pipe,
      bore: {
        outsideDiameterMm: 114.3,
        wallMm: 6.02,
        liningMm: 0,
        insideDiameterMm: 102.26,
        label: "DN 100, carbon steel",
      },
    });
    for (const [part, wrong] of [
      ["tableId", { ...pipe, tableId: "none" }],
      ["dn", { ...pipe, dn: 101 }],
      [
        "wallMm",
        { kind: "measured", outsideDiameterMm: 50, wallMm: 25, liningMm: 0, material: null },
      ],
    ] as const) {
      const refused = await engineer.patch(`/points/${point.id}`, { pipe: wrong }).expect(422);
      expect(refused.body.errors[0].pointer).toBe(`/body/pipe/${part}`);
    }
  });

  test("another pipe is a dated version; the same pipe is not", async () => {
    const engineer = await signedIn(app);
    const loop = await makeLoop(engineer, (await makeSite(engineer)).id);
    const table = { kind: "table", tableId: "asme-b36.10m-40", dn: 100 };
    const point = await makePoint(engineer, loop.id, { pipe: table });
    const begun = app.clock.date().toISOString();
    app.clock.advance({ days: 3 });
    await engineer.patch(`/points/${point.id}`, { pipe: table, name: "Renamed" }).expect(200);
    const taped = {
      kind: "measured",
      outsideDiameterMm: 114.3,
      wallMm: 5.67,
      liningMm: 0,
      material: "steel",
    };
    const { body: now } = await engineer.patch(`/points/${point.id}`, { pipe: taped }).expect(200);
    expect(now.bore.insideDiameterMm).toBeCloseTo(102.96, 9);
    const { body: history } = await engineer.get(`/points/${point.id}/bores`).expect(200);
    const changed = app.clock.date().toISOString();
    expect(history.items).toMatchObject([
      { validFrom: changed, validTo: null, pipe: taped },
      { validFrom: begun, validTo: changed, pipe: table },
    ]);
    const { body: unknown } = await engineer.patch(`/points/${point.id}`, { pipe: null });
    expect(unknown).toMatchObject({ pipe: null, bore: null });
  });

  test("codes are unique on a loop and parents stay on it", async () => {
    const engineer = await signedIn(app);
    const site = await makeSite(engineer);
    const loop = await makeLoop(engineer, site.id);
    const other = await makeLoop(engineer, site.id, { tag: "CHW-2" });
    const main = await makePoint(engineer, loop.id);
    const stranger = await makePoint(engineer, other.id);
    const branch = { code: "P2", name: "Branch", role: "branch", meterSide: "supply" };
    const path = `/loops/${loop.id}/points`;
    const twice = await engineer.post(path, { ...branch, code: "P1" }).expect(422);
    expect(twice.body.errors[0].pointer).toBe("/body/code");
    const astray = { ...branch, parentPointId: stranger.id };
    const refused = await engineer.post(path, astray).expect(422);
    expect(refused.body.errors[0].pointer).toBe("/body/parentPointId");
    const { body: child } = await engineer.post(path, { ...branch, parentPointId: main.id });
    const ring = await engineer.patch(`/points/${main.id}`, { parentPointId: child.id });
    expect(ring.body.errors[0].code).toBe("parent-ring");
  });

  test("an archived point leaves its loop's list and gives its code back", async () => {
    const engineer = await signedIn(app);
    const loop = await makeLoop(engineer, (await makeSite(engineer)).id);
    const point = await makePoint(engineer, loop.id);
    await engineer.patch(`/points/${point.id}`, { archived: true }).expect(200);
    const listed = async (query: string) =>
      (await engineer.get(`/loops/${loop.id}/points${query}`)).body.items.length;
    expect(await listed("")).toBe(0);
    expect(await listed("?archived=true")).toBe(1);
    await makePoint(engineer, loop.id);
  });
});

test("another organisation's site, building, loop and point are not found", async () => {
  const owner = await signedIn(app);
  const site = await makeSite(owner);
  const { body: shed } = await owner.post(`/sites/${site.id}/buildings`, { name: "Shed" });
  const loop = await makeLoop(owner, site.id);
  const point = await makePoint(owner, loop.id);
  const stranger = await signedIn(app);
  for (const path of [`/sites/${site.id}`, `/loops/${loop.id}`, `/points/${point.id}`]) {
    await stranger.get(path).expect(404);
    await stranger.patch(path, { name: "Mine" }).expect(404);
    await stranger.delete(path).expect(404);
  }
  await stranger.patch(`/buildings/${shed.id}`, { name: "Mine" }).expect(404);
  await stranger.get(`/sites/${site.id}/overview?from=2026-03-02&to=2026-03-09`).expect(404);
  const mine = await makeSite(stranger);
  const body = { ...chilled, buildingId: shed.id };
  await stranger.post(`/sites/${mine.id}/loops`, body).expect(422);
});

describe("the site page", () => {
  async function giveDay(agent: Agent, pointId: string, date: string, coveredS = 86_400) {
    const register = (name: string) =>
      `${name}_kwh, ${name}_m3, ${name}_flow_dt, ${name}_power_dt, ${name}_dt, ${name}_s`;
    await app.database.query(
      `INSERT INTO day_energy (point_id, local_date, organisation_id, start_ms, length_s, covered_s,
         ${register("heating")}, ${register("cooling")}, volume_m3, suppressed_kwh, suppressed_s,
         supply_cs, return_cs, measured_rows, excluded_rows, no_reading_rows, outside_water_rows,
         apportioned, engine_version)
       VALUES (:pointId, :date, :organisationId, 0, 86400, :coveredS, 1, 1, 1, 0, 0, 0,
         100, 20, 98, 0, 0, 0, 21, 0, 0, 0, 0, 0, 0, 0, 0, 0, 1)`,
      { replacements: { pointId, date, coveredS, organisationId: agent.organisationId } },
    );
  }

  test("a loop shows its service's register over the days asked for, so far", async () => {
    const engineer = await signedIn(app);
    const site = await makeSite(engineer);
    const loop = await makeLoop(engineer, site.id);
    const pipe = { kind: "table", tableId: "asme-b36.10m-40", dn: 100 };
    const branch = await makePoint(engineer, loop.id, { code: "B", role: "branch" });
    const main = await makePoint(engineer, loop.id, { code: "M", pipe });
    await giveReadings(engineer, main.id);
    const today = app.clock.date().toISOString().slice(0, 10);
    const monday = new Date(app.clock.now() - 86_400_000).toISOString().slice(0, 10);
    await giveDay(engineer, main.id, monday);
    await giveDay(engineer, main.id, today, 0);
    await giveDay(engineer, branch.id, today);
    await app.database.query(
      `INSERT INTO interval_energy (point_id, start_s, excluded_rows, covered_s, engine_version)
       VALUES (:id, :first, NULL, NULL, 1), (:id, :second, 5, 400, 1)`,
      {
        replacements: {
          id: main.id,
          first: Date.parse(`${today}T00:00Z`) / 1000,
          second: Date.parse(`${today}T00:15Z`) / 1000,
        },
      },
    );
    const end = new Date(app.clock.now() + 6 * 86_400_000).toISOString().slice(0, 10);
    const path = `/sites/${site.id}/overview?from=${monday}&to=${end}`;
    const { body } = await engineer.get(path).expect(200);
    expect(body.loops).toHaveLength(1);
    const [shown] = body.loops;
    expect(shown).toMatchObject({
      mainPointId: main.id,
      nominalSizeDn: 100,
      energyKwh: 200,
      coolingKwh: 200,
      heatingKwh: 2,
    });
    // Σ∫q·Δθ dt / Σ volume = 196 / 40.
    expect(shown.flowWeightedDeltaTK).toBeCloseTo(4.9, 9);
    const sinceMondayS = (app.clock.now() - Date.parse(`${monday}T00:00Z`)) / 1000;
    expect(shown.coverage).toBeCloseTo(86_400 / sinceMondayS, 9);
    expect(shown.quality.map((part: { kind: string }) => part.kind)).toEqual([
      "missing",
      "measured",
      "excluded",
      "missing",
    ]);
    expect(shown.quality.at(-1).to).toBe(app.clock.date().toISOString());
  });

  test("a loop without a point and an empty range of days have no figures", async () => {
    const engineer = await signedIn(app);
    const site = await makeSite(engineer);
    await makeLoop(engineer, site.id, { service: "changeover" });
    const overview = `/sites/${site.id}/overview`;
    const { body } = await engineer.get(`${overview}?from=2026-02-23&to=2026-03-02`).expect(200);
    expect(body).toMatchObject({ firstReadingAt: null, lastReadingAt: null });
    expect(body.loops[0]).toMatchObject({
      mainPointId: null,
      energyKwh: null,
      heatingKwh: null,
      coverage: null,
      quality: [],
    });
    await engineer.get(`${overview}?from=2026-03-02&to=2026-03-02`).expect(422);
  });
});

test("the pipe tables are all there with their rows", async () => {
  const engineer = await signedIn(app);
  const { body } = await engineer.get("/pipe-tables").expect(200);
  const table = body.items.find((item: { id: string }) => item.id === "en-545-k9");
  expect(table.rows[1]).toEqual({
    dn: 100,
    outsideDiameterMm: 118,
    wallMm: 6,
    liningMm: 4,
    insideDiameterMm: 98,
  });
});
