import type { TodayAnswer } from "@shared/contracts/energy";
import { MINUTE_MS } from "@shared/domain/time/interval";
import { RowQuality } from "@shared/domain/readings/reading-columns";
import { Loop } from "@server/models/loop";
import { MeteringPoint } from "@server/models/metering-point";
import { signedIn } from "@server/testing/factories";
import { pointToMeter } from "@server/testing/place-factories";
import { loggedRows, storedReadings, type RowWishes } from "@server/testing/reading-factories";
import { testApp } from "@server/testing/test-app";

const app = testApp();

const stepMs = 15 * MINUTE_MS;
// Two whole weeks that end with Sunday 1 March 2026, the day before the test clock's.
const fromMs = Date.UTC(2026, 1, 16);
const count = 14 * 96;

async function site() {
  const engineer = await signedIn(app);
  const { organisationId } = engineer;
  const main = await pointToMeter(app, organisationId);
  const read = (pointId: string, wishes: Partial<RowWishes> = {}) =>
    storedReadings(
      app,
      { organisationId, pointId },
      loggedRows({ fromMs, count, stepMs, ...wishes }),
      stepMs,
    );
  const branch = async (tag: string) => {
    const loop = await Loop.create({
      organisationId,
      siteId: main.site.id,
      parentLoopId: main.loop.id,
      tag,
      name: `${tag} branch`,
      service: "chilled",
      createdAt: app.clock.date(),
    });
    const point = await MeteringPoint.create({
      organisationId,
      loopId: loop.id,
      code: tag,
      name: tag,
      role: "main",
      meterSide: "return",
      createdAt: app.clock.date(),
    });
    return { loop, point };
  };
  const today = async (): Promise<TodayAnswer> =>
    (await engineer.get(`/sites/${main.site.id}/today`).expect(200)).body;
  return { main, read, branch, today };
}

const codes = (answer: TodayAnswer) =>
  answer.needsALook.map((finding) => [finding.code, finding.loop?.tag ?? null]);

it("shows each loop's last whole day, the main first, and finds nothing where all is well", async () => {
  const { main, read, branch, today } = await site();
  const a = await branch("A-1");
  await read(main.point.id);
  await read(a.point.id, { flow: () => 28.5 });
  const answer = await today();
  expect(answer.day).toBe("2026-03-01");
  expect(answer.loops.map(({ loop }) => [loop.tag, loop.isMain])).toEqual([
    [main.loop.tag, true],
    ["A-1", false],
  ]);
  // The trade's worked interval: 28.8 m³/h, 6.90 → 12.80 °C, meter on the return → 197.798 kW.
  expect(answer.loops[0]?.card?.powerKw).toBeCloseTo(197.798, 2);
  expect(answer.loops[0]?.card?.register).toBe("cooling");
  expect(codes(answer)).toEqual([]);
});

it("compares main and branches over common hours only", async () => {
  const { main, read, branch, today } = await site();
  const a = await branch("A-1");
  await read(main.point.id);
  // A tenth is in no branch; a day's gap in the branch must not add to it.
  await read(a.point.id, { flow: () => 25.92, without: (row) => row >= 96 * 8 && row < 96 * 9 });
  const answer = await today();
  const balance = answer.needsALook.find(({ code }) => code === "unmeteredRemainder");
  expect(balance?.loop?.tag).toBe(main.loop.tag);
  expect(balance?.values.share).toBeCloseTo(0.1, 4);
  expect(balance?.values.from).toBe("2026-02-23");
  expect(balance?.values.hours).toBeLessThan(168 - 23);
});

it("names a loop that stopped, one with excluded rows, and a pump that runs for nothing", async () => {
  const { main, read, branch, today } = await site();
  const stopped = await branch("B-1");
  const weak = await branch("B-2");
  const idle = await branch("B-3");
  await read(main.point.id);
  await read(stopped.point.id, { count: 96 * 9 });
  await read(weak.point.id, {
    quality: (row) => (row > 96 * 12 && row < 96 * 13 ? RowQuality.excluded : RowQuality.measured),
  });
  await read(idle.point.id, { return: (row) => (row >= 96 * 13 ? 7.5 : 12.8) });
  const found = codes(await today());
  expect(found).toContainEqual(["noRecentReadings", "B-1"]);
  expect(found).toContainEqual(["lowCoverage", "B-2"]);
  expect(found).toContainEqual(["pumpWithoutDeltaT", "B-3"]);
  expect(found[0]?.[0]).not.toBe("pumpWithoutDeltaT");
});

it("says since when the whole site is silent, once and not for each loop", async () => {
  const { main, read, branch, today } = await site();
  const a = await branch("A-1");
  await read(main.point.id, { count: 96 * 10 });
  await read(a.point.id, { count: 96 * 10 });
  const silent = (await today()).needsALook.filter(({ code }) => code === "noRecentReadings");
  expect(silent).toHaveLength(1);
  expect(silent[0]?.values).toMatchObject({ since: "2026-02-25T23:45:00.000Z", loops: 2 });
});

it("tells a loop without a point from one without readings", async () => {
  const { main, today } = await site();
  await Loop.create({
    organisationId: main.loop.organisationId,
    siteId: main.site.id,
    tag: "Z-9",
    name: "No point yet",
    service: "hot",
    createdAt: app.clock.date(),
  });
  const answer = await today();
  expect(answer.day).toBeNull();
  expect(answer.loops.map((loop) => loop.emptyReason)).toEqual(["noReadings", "noPoint"]);
});
