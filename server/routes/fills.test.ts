import type { z } from "zod";
import type { getSiteOverview } from "@shared/contracts/places";
import { Loop } from "@server/models/loop";
import { signedIn, type Agent } from "@server/testing/factories";
import { pointToMeter } from "@server/testing/place-factories";
import { loggedRows, storedReadings } from "@server/testing/reading-factories";
import { testApp } from "@server/testing/test-app";

type SiteOverviewAnswer = z.output<(typeof getSiteOverview)["answer"]>;

const app = testApp();
const minute = 60_000;
const day = 1440 * minute;
/** A Monday. */
const from = Date.UTC(2026, 1, 2);
const at = (ms: number) => new Date(from + ms).toISOString();
const hourKwh = 197.798;

/** Five working days at five minutes, without Friday from 8 to 12 o'clock, unless wished otherwise. */
async function withGap(
  role: "engineer" | "surveyor" = "engineer",
  hours: [number, number] = [8, 12],
) {
  const agent = await signedIn(app, { role });
  const { organisationId } = agent;
  const { site, loop, point } = await pointToMeter(app, organisationId);
  const gap = hours.map((hour) => 4 * day + hour * 60 * minute) as [number, number];
  const rows = loggedRows({
    fromMs: from,
    count: 5 * 288 + 1,
    stepMs: 5 * minute,
    // 100, 110, 120 % of the worked interval's flow on Tuesday, Wednesday and Thursday.
    flow: (row) => 28.8 * ([1, 1, 1.1, 1.2][Math.floor(row / 288)] ?? 1),
    without: (row) => row * 5 * minute > gap[0] && row * 5 * minute < gap[1],
  });
  await storedReadings(app, { organisationId, pointId: point.id }, rows, 5 * minute);
  return { agent, organisationId, site, loop, point, gap };
}

const proposal = (gap: readonly [number, number], wanted: object) => ({
  from: at(gap[0]),
  to: at(gap[1]),
  reason: "the logger was flat",
  ...wanted,
});

async function totalsOf(agent: Agent, pointId: string) {
  const { body } = await agent
    .get(`/points/${pointId}/energy?from=2026-02-06&to=2026-02-07&step=total`)
    .expect(200);
  return body.totals;
}

test("four hours of Friday as the mean of the three working days before, beside what was measured", async () => {
  const { agent, point, gap } = await withGap();
  const before = await totalsOf(agent, point.id);
  expect(before.filled).toBeNull();
  const { body: fill } = await agent
    .post(`/points/${point.id}/fills`, proposal(gap, { method: "likeDays" }))
    .expect(201);
  // The mean of 1.0, 1.1 and 1.2 times 4 h; ± 0.1·√(4/3) of 1.1.
  expect(fill).toMatchObject({
    state: "proposed",
    filledS: 4 * 3600,
    heatingKwh: 0,
    days: ["2026-02-03", "2026-02-04", "2026-02-05"],
  });
  expect(fill.coolingKwh).toBeCloseTo(4 * 1.1 * hourKwh, 1);
  expect(fill.uncertaintyPercent).toBeCloseTo((0.1 * Math.sqrt(4 / 3) * 100) / 1.1, 2);
  const during = await totalsOf(agent, point.id);
  expect({ ...during, filled: null }).toEqual(before);
  expect(during.filled).toMatchObject({ filledS: 4 * 3600, approvedOnly: false });
  expect(during.filled.coolingKwh).toBeCloseTo(fill.coolingKwh, 5);
  // The fill's standard uncertainty, expanded.
  expect(fill.uncertaintyPercent).toBeGreaterThan(0);
  expect(during.filled.coolingExpandedKwh).toBeCloseTo(
    (2 * fill.uncertaintyPercent * fill.coolingKwh) / 100,
    4,
  );

  await agent.post(`/fills/${fill.id}/approval`, {}).expect(200);
  expect((await totalsOf(agent, point.id)).filled.approvedOnly).toBe(true);
  await agent.post(`/fills/${fill.id}/withdrawal`, {}).expect(200);
  expect(await totalsOf(agent, point.id)).toEqual(before);
  const { body: list } = await agent.get(`/points/${point.id}/fills`).expect(200);
  expect(list.items).toMatchObject([{ id: fill.id, state: "withdrawn" }]);
});

test("a filled gap is named filled on the strip, among what was left out and in the month", async () => {
  const { agent, point, gap } = await withGap();
  const { body: fill } = await agent
    .post(`/points/${point.id}/fills`, proposal(gap, { method: "likeDays" }))
    .expect(201);
  await agent.post(`/fills/${fill.id}/approval`, {}).expect(200);
  const range = "from=2026-02-06&to=2026-02-07";
  const { body: series } = await agent
    .get(`/points/${point.id}/series?${range}&pixels=1200`)
    .expect(200);
  const kinds = (series.quality as { kind: string }[]).map(({ kind }) => kind);
  expect(kinds).toEqual(["measured", "filled", "measured"]);
  const { body: summary } = await agent.get(`/points/${point.id}/summary?${range}`).expect(200);
  expect(summary.leftOut).toMatchObject([{ kind: "filled", from: at(gap[0]), to: at(gap[1]) }]);
  const { body: marks } = await agent.get(`/points/${point.id}/days?${range}`).expect(200);
  expect(marks.days).toMatchObject([{ date: "2026-02-06", kind: "filled" }]);
  const loop = await Loop.findByPk(point.loopId, { rejectOnEmpty: true });
  const { body: site } = await agent.get(`/sites/${loop.siteId}/overview?${range}`).expect(200);
  const [row] = (site as SiteOverviewAnswer).loops;
  expect(row?.quality.map(({ kind }) => kind)).toEqual(["measured", "filled", "measured"]);
  // 4 of 24 hours.
  expect(row?.filledShare).toBeCloseTo(4 / 24, 6);
  expect(row?.coverage).toBeCloseTo(20 / 24, 3);
});

test("half an hour is joined by a line, and an hour and more is not", async () => {
  const { agent, point, gap } = await withGap("engineer", [8, 8.5]);
  const { body: fill } = await agent
    .post(`/points/${point.id}/fills`, proposal(gap, { method: "interpolation" }))
    .expect(201);
  expect(fill.coolingKwh).toBeCloseTo(hourKwh / 2, 2);
  expect(fill.volumeM3).toBeCloseTo(14.4, 6);
  const long = await withGap();
  const { body: refused } = await long.agent
    .post(`/points/${long.point.id}/fills`, proposal(long.gap, { method: "interpolation" }))
    .expect(422);
  expect(refused.errors[0]).toMatchObject({ pointer: "/body/method", code: "gap-too-long" });
});

test("another point fills by its ratio, and no point of another organisation", async () => {
  const { agent, organisationId, point, gap } = await withGap();
  const other = await pointToMeter(app, organisationId);
  const rows = loggedRows({
    fromMs: from,
    count: 5 * 288 + 1,
    stepMs: 5 * minute,
    flow: (row) => 14.4 * ([1, 1, 1.1, 1.2][Math.floor(row / 288)] ?? 1),
  });
  await storedReadings(app, { organisationId, pointId: other.point.id }, rows, 5 * minute);
  const by = (otherPointId: string) =>
    agent.post(`/points/${point.id}/fills`, proposal(gap, { method: "otherPoint", otherPointId }));
  const stranger = await withGap();
  await by(stranger.point.id).expect(422);
  await by(point.id).expect(422);
  const { body: fill } = await by(other.point.id).expect(201);
  // Twice the other's four hours: it always moved half.
  expect(fill.coolingKwh).toBeCloseTo(4 * hourKwh, 1);
  expect(fill.uncertaintyPercent).toBeLessThan(0.01);
});

test("readings that come in later take the fill's place, to the second", async () => {
  const { agent, organisationId, point, gap } = await withGap();
  await agent.post(`/points/${point.id}/fills`, proposal(gap, { method: "likeDays" })).expect(201);
  const rows = loggedRows({ fromMs: from + gap[0], count: 25, stepMs: 5 * minute });
  await storedReadings(app, { organisationId, pointId: point.id }, rows, 5 * minute);
  const { filled, coveredS } = await totalsOf(agent, point.id);
  expect(coveredS).toBe(22 * 3600);
  expect(filled.filledS).toBe(2 * 3600);
  expect(filled.coolingKwh).toBeCloseTo(2 * 1.1 * hourKwh, 1);
});

test("a surveyor proposes and withdraws, and neither approves nor undoes an approval", async () => {
  const { agent, organisationId, point, gap } = await withGap("surveyor");
  const ask = () => agent.post(`/points/${point.id}/fills`, proposal(gap, { method: "likeDays" }));
  const { body: fill } = await ask().expect(201);
  expect(fill.can).toEqual({ approve: false, withdraw: true });
  expect((await ask().expect(409)).body.code).toBe("fill-overlaps");
  await agent.post(`/fills/${fill.id}/approval`, {}).expect(403);
  const engineer = await signedIn(app, { role: "engineer", organisationId });
  await engineer.post(`/fills/${fill.id}/approval`, {}).expect(200);
  expect((await engineer.post(`/fills/${fill.id}/approval`, {}).expect(409)).body.code).toBe(
    "fill-approved",
  );
  await agent.post(`/fills/${fill.id}/withdrawal`, {}).expect(403);
});

test("nothing is filled where readings cover all, nor before three like days were measured", async () => {
  const { agent, point } = await withGap();
  const code = async (span: readonly [number, number]) => {
    const { body } = await agent
      .post(`/points/${point.id}/fills`, proposal(span, { method: "likeDays" }))
      .expect(422);
    return body.errors[0].code;
  };
  expect(await code([day, day + 60 * minute])).toBe("nothing-to-fill");
  expect(await code([5 * day + 60 * minute, 6 * day])).toBe("too-few-like-days");
});
