import type {
  BathCheck,
  Installation,
  Instrument,
  WorkedOutInstallation,
} from "@shared/contracts/evidence";
import { AuditEvent } from "@server/models/audit-event";
import { Installation as InstallationRow } from "@server/models/installation";
import { loadInstallationsOf } from "@server/queries/evidence/point-evidence";
import { scoped } from "@server/database/scoped";
import { signedIn, type Agent } from "@server/testing/factories";
import { pointToMeter } from "@server/testing/place-factories";
import { testApp } from "@server/testing/test-app";

const app = testApp();

const readings = Array.from({ length: 10 }, (_, at) => ({
  firstC: 4.11 + (at % 2) / 100,
  secondC: 4 + (at % 2) / 100,
}));

async function make<Answer>(agent: Agent, path: string, body: object): Promise<Answer> {
  return (await agent.post(path, body).expect(201)).body as Answer;
}

/** An engineer with a point on a chilled loop at 0.4 MPa absolute, and a kit. */
async function kitAndPoint() {
  const agent = await signedIn(app, { role: "engineer" });
  const { loop, point } = await pointToMeter(app, agent.organisationId);
  await loop.update({ gaugePressureMPa: 0.298675 });
  const probe = (serial: string) =>
    make<Instrument>(agent, "/instruments", { kind: "probe", serial, probeClass: "B" });
  const meter = await make<Instrument>(agent, "/instruments", {
    kind: "flowMeter",
    serial: "50417",
  });
  return { agent, point, meter, warm: await probe("T-1"), cold: await probe("T-2") };
}

/** The S01 installation as read on the pipe. */
const s01 = {
  startsAt: "2026-02-20T09:00:00Z",
  pipe: {
    circumferenceMm: 359.1,
    outsideDiameterMm: null,
    wallReadingsMm: [5.62, 5.71, 5.66, 5.69],
    liningMm: 0,
  },
  enteredBoreMm: 102.26,
  straightRun: { upstreamM: 0.92, downstreamM: 0.61, nearestFitting: "bend" },
  shownFlowLPerS: 8,
  zero: { flowStopped: true, readingMPerS: 0.012, remainingMPerS: null, action: "none" },
};

describe("an installation as S01 reads it", () => {
  const soundSpeed = (displayedMPerS: number) => ({ displayedMPerS, fluidC: 11.2 });

  async function tried(displayedMPerS: number) {
    const { agent, point } = await kitAndPoint();
    const { body } = await agent
      .post(`/points/${point.id}/installations/try`, {
        ...s01,
        soundSpeed: soundSpeed(displayedMPerS),
      })
      .expect(200);
    const answer = body as WorkedOutInstallation;
    const verdict = (code: string) => answer.verdicts.find((one) => one.code === code);
    return { answer, verdict, point };
  }

  it("gives bore, flow put right by it, and the zero as flow", async () => {
    const { answer, verdict } = await tried(1449);
    expect(answer.bore?.outsideDiameterMm).toBeCloseTo(114.3051, 4);
    expect(answer.bore?.wallMeanMm).toBeCloseTo(5.67, 6);
    expect(answer.bore?.wallDeviationMm).toBeCloseTo(0.0391578, 6);
    expect(answer.bore?.insideDiameterMm).toBeCloseTo(102.9651, 4);
    expect(answer.bore?.uncertaintyMm).toBeCloseTo(0.2270095, 5);
    expect(answer.bore?.flowFactor).toBeCloseTo(1.013837, 6);
    expect(answer.correctedFlowLPerS).toBeCloseTo(8.1107, 4);
    expect(answer.zeroLPerS).toBeCloseTo(0.09991968, 6);
    expect(verdict("boreEnteredDiffers")?.values.flowPercent).toBeCloseTo(1.3837, 4);
    expect(verdict("boreEnteredDiffers")?.adds).toEqual({ kind: "block", blocks: "billing" });
    expect(verdict("reynoldsFine")?.values.reynolds).toBeCloseTo(78381.41, -1);
    expect(verdict("velocityFine")?.values.velocityMPerS).toBeCloseTo(0.9607717, 6);
  });

  it("warns of the short run before the meter and lets the one after it pass", async () => {
    const { verdict } = await tried(1449);
    expect(verdict("straightRunUpstreamShort")).toMatchObject({
      weight: "look",
      adds: { kind: "term", term: "profile" },
    });
    expect(verdict("straightRunUpstreamShort")?.values.upstreamBores).toBeCloseTo(8.935068, 5);
    expect(verdict("straightRunDownstreamShort")).toBeUndefined();
  });

  it("takes a sound speed 0.2 % off and refuses one 4.3 % off", async () => {
    const { verdict: near } = await tried(1449);
    expect(near("soundSpeedPlausible")?.values.deviationPercent).toBeCloseTo(-0.2056199, 5);
    const { verdict: far } = await tried(1389);
    expect(far("soundSpeedImplausible")).toMatchObject({
      weight: "stop",
      adds: { kind: "block", blocks: "use" },
    });
    expect(far("soundSpeedImplausible")?.values.deviationPercent).toBeCloseTo(-4.337892, 5);
  });

  it("keeps nothing of what is only tried", async () => {
    const { point } = await tried(1449);
    expect(await InstallationRow.count({ where: { pointId: point.id } })).toBe(0);
  });
});

describe("the kit", () => {
  it("counts a certificate until the day it is due and tells 30 days before", async () => {
    const { agent, meter } = await kitAndPoint();
    const path = `/instruments/${meter.id}/certificates`;
    const add = (number: string, issuedOn: string, dueOn: string) =>
      make<Instrument>(agent, path, { number, issuedOn, dueOn, expanded: 1 });
    expect(meter.calibration).toBe("none");
    expect((await add("C-1", "2025-01-01", "2026-03-01")).calibration).toBe("lapsed");
    expect((await add("C-2", "2025-02-01", "2026-03-02")).calibration).toBe("dueSoon");
    const last = await add("C-3", "2026-01-05", "2027-01-05");
    expect(last.calibration).toBe("inDate");
    const [newest] = last.certificates;
    const withdrawal = `/certificates/${newest?.id}/withdrawal`;
    const { body } = await agent.post(withdrawal, { reason: "Of another meter" }).expect(200);
    expect(body).toMatchObject({
      calibration: "dueSoon",
      certificates: [{ number: "C-2" }, {}, {}],
    });
    await agent.post(withdrawal, { reason: "Twice" }).expect(409);
  });

  it("gives a serial to one instrument of a kind only, until it is archived", async () => {
    const { agent, meter } = await kitAndPoint();
    const again = await agent.post("/instruments", { kind: "flowMeter", serial: "50417" });
    expect([again.status, again.body.errors[0].pointer]).toEqual([422, "/body/serial"]);
    await make(agent, "/instruments", { kind: "logger", serial: "50417" });
    await agent.patch(`/instruments/${meter.id}`, { archived: true }).expect(200);
    await make(agent, "/instruments", { kind: "flowMeter", serial: "50417" });
    await agent.patch(`/instruments/${meter.id}`, { archived: false }).expect(409);
  });
});

describe("a same-bath check", () => {
  it("belongs to serials, measures drift whichever probe is named first, and is corrected by another", async () => {
    const { agent, warm, cold } = await kitAndPoint();
    const pair = { firstProbeId: warm.id, secondProbeId: cold.id };
    const first = await make<BathCheck>(agent, "/bath-checks", {
      ...pair,
      checkedOn: "2026-01-10",
      readings,
    });
    expect(first).toMatchObject({
      firstSerial: "T-1",
      secondSerial: "T-2",
      pairs: 10,
      driftK: null,
    });
    expect(first.meanDifferenceK).toBeCloseTo(0.11, 9);
    const turned = await make<BathCheck>(agent, "/bath-checks", {
      firstProbeId: cold.id,
      secondProbeId: warm.id,
      checkedOn: "2026-02-10",
      readings: readings.map(({ firstC, secondC }) => ({
        firstC: secondC,
        secondC: firstC + 0.06,
      })),
    });
    expect(turned.driftK).toBeCloseTo(-0.06, 9);
    expect(turned.verdicts).toContainEqual(expect.objectContaining({ code: "bathCheckDrift" }));
    const right = await make<BathCheck>(agent, "/bath-checks", {
      ...pair,
      checkedOn: "2026-01-10",
      readings: readings.map(({ firstC, secondC }) => ({ firstC: firstC + 0.06, secondC })),
      replaces: first.id,
    });
    expect(right.replacesId).toBe(first.id);
    const after = (await agent.get(`/bath-checks/${turned.id}`).expect(200)).body as BathCheck;
    expect(after.driftK).toBeCloseTo(0, 9);
    const old = (await agent.get(`/bath-checks/${first.id}`).expect(200)).body as BathCheck;
    expect([old.supersededAt === null, old.can.edit]).toEqual([false, false]);
    await agent
      .post("/bath-checks", { ...pair, checkedOn: "2026-01-10", readings, replaces: first.id })
      .expect(409);
  });

  it("is of two different probes", async () => {
    const { agent, warm, meter } = await kitAndPoint();
    const body = { firstProbeId: warm.id, checkedOn: "2026-02-10", readings };
    await agent.post("/bath-checks", { ...body, secondProbeId: warm.id }).expect(422);
    await agent.post("/bath-checks", { ...body, secondProbeId: meter.id }).expect(422);
  });
});

describe("versions of an installation", () => {
  const onPipe = { mounting: "pocket", depthMm: 60, insulated: true };

  it("are superseded with a reason, and the earlier one stays as it was", async () => {
    const { agent, point } = await kitAndPoint();
    const path = `/points/${point.id}/installations`;
    const first = await make<Installation>(agent, path, s01);
    const correction = { ...s01, enteredBoreMm: null, supersedes: first.id };
    const without = await agent.post(path, correction);
    expect([without.status, without.body.errors[0].pointer]).toEqual([422, "/body/reason"]);
    const second = await make<Installation>(agent, path, {
      ...correction,
      reason: "The meter shows speed only",
    });
    expect(second).toMatchObject({ version: 2, supersedesId: first.id, enteredBoreMm: null });
    const old = (await agent.get(`/installations/${first.id}`).expect(200)).body as Installation;
    expect(old).toMatchObject({ version: 1, enteredBoreMm: 102.26, can: { edit: false } });
    expect(old.supersededAt).not.toBeNull();
    const listed = async (query: string) =>
      ((await agent.get(`${path}${query}`).expect(200)).body.items as Installation[]).map(
        ({ id }) => id,
      );
    expect(await listed("")).toEqual([second.id]);
    expect(await listed("?superseded=true")).toEqual([second.id, first.id]);
    await agent.post(path, { ...correction, reason: "Too late" }).expect(409);
    const kinds = await AuditEvent.findAll({
      where: { organisationId: agent.organisationId, subjectKind: "installation" },
      order: [["id", "ASC"]],
    });
    expect(kinds.map(({ kind }) => kind)).toEqual([
      "installation-recorded",
      "installation-corrected",
    ]);
  });

  it("speak until they end or the next one starts, and a withdrawn one does not speak", async () => {
    const { agent, point } = await kitAndPoint();
    const path = `/points/${point.id}/installations`;
    const at = (day: number) => Date.UTC(2026, 1, day);
    const from = (day: number, endDay: number | null) => ({
      startsAt: new Date(at(day)).toISOString(),
      endsAt: endDay === null ? null : new Date(at(endDay)).toISOString(),
    });
    await make(agent, path, from(1, 20));
    const second = await make<Installation>(agent, path, from(10, null));
    await agent.post(path, from(10, 12)).expect(422);
    const spans = async (startDay: number, endDay: number) => {
      const range = { startMs: at(startDay), endMs: at(endDay) };
      const { installations } = await loadInstallationsOf(
        scoped(agent.organisationId),
        point.id,
        range,
      );
      return installations.map(({ startMs, endMs }) => [startMs, endMs]);
    };
    expect(await spans(1, 28)).toEqual([
      [at(1), at(10)],
      [at(10), null],
    ]);
    expect(await spans(1, 10)).toEqual([[at(1), at(10)]]);
    await agent
      .post(`/installations/${second.id}/withdrawal`, { reason: "On another point" })
      .expect(200);
    expect(await spans(1, 28)).toEqual([[at(1), at(20)]]);
  });

  it("take the newest check of the pair by their start, its correction, or the one chosen", async () => {
    const { agent, point, warm, cold } = await kitAndPoint();
    const pair = { firstProbeId: warm.id, secondProbeId: cold.id };
    const check = (checkedOn: string, more: object = {}) =>
      make<BathCheck>(agent, "/bath-checks", { ...pair, checkedOn, readings, ...more });
    const before = await check("2026-02-01");
    const after = await check("2026-02-25");
    const probes = {
      supply: { ...onPipe, probeId: warm.id },
      return: { ...onPipe, probeId: cold.id },
    };
    const used = async (more: object) => {
      const path = `/points/${point.id}/installations/try`;
      const { body } = await agent.post(path, { ...s01, probes, ...more }).expect(200);
      return (body as WorkedOutInstallation).bathCheckUsed?.id;
    };
    expect(await used({})).toBe(before.id);
    expect(await used({ bathCheckId: after.id })).toBe(after.id);
    const right = await check("2026-02-01", { replaces: before.id });
    expect(await used({})).toBe(right.id);
    expect(await used({ bathCheckId: before.id })).toBe(right.id);
    expect(await used({ startsAt: "2026-01-01T00:00:00Z" })).toBeUndefined();
  });

  it("are indicative with a clamp-on meter or a probe on the surface", async () => {
    const { agent, point, meter, warm, cold } = await kitAndPoint();
    const indicative = async (more: object) => {
      const path = `/points/${point.id}/installations/try`;
      const { body } = await agent.post(path, { ...s01, ...more }).expect(200);
      return (body as WorkedOutInstallation).indicativeOnly;
    };
    const probes = (mounting: string) => ({
      supply: { ...onPipe, probeId: warm.id },
      return: { ...onPipe, mounting, probeId: cold.id },
    });
    expect(await indicative({})).toBe(false);
    expect(await indicative({ probes: probes("pocket") })).toBe(false);
    expect(await indicative({ probes: probes("surface") })).toBe(true);
    expect(await indicative({ flowMeterId: meter.id })).toBe(true);
  });

  it("name what contradicts at its field", async () => {
    const { agent, point, meter, warm } = await kitAndPoint();
    const pointer = async (body: object) => {
      const path = `/points/${point.id}/installations/try`;
      const answer = await agent.post(path, { ...s01, ...body });
      return [answer.status, answer.body.errors?.[0]?.pointer];
    };
    expect(await pointer({ endsAt: s01.startsAt })).toEqual([422, "/body/endsAt"]);
    expect(await pointer({ flowMeterId: warm.id })).toEqual([422, "/body/flowMeterId"]);
    expect(await pointer({ loggerId: meter.id })).toEqual([422, "/body/loggerId"]);
    expect(await pointer({ pipe: { ...s01.pipe, liningMm: 25, wallReadingsMm: [40] } })).toEqual([
      422,
      "/body/pipe/wallReadingsMm",
    ]);
    expect(await pointer({ pipe: { ...s01.pipe, circumferenceMm: null } })).toEqual([
      422,
      "/body/pipe/circumferenceMm",
    ]);
  });
});

it("a point with evidence cannot be removed", async () => {
  const { agent, point } = await kitAndPoint();
  await make(agent, `/points/${point.id}/installations`, s01);
  const { status, body } = await agent.delete(`/points/${point.id}`);
  expect([status, body.code]).toEqual([409, "holds-readings"]);
});
