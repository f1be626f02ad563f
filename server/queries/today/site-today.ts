import type { TodayAnswer } from "@shared/contracts/energy";
import { localDateOf, localDay } from "@shared/domain/time/local-calendar";
import type { Database } from "@server/database/connect";
import { instantText } from "@server/database/conversions";
import type { Scope } from "@server/database/scoped";
import type { Site } from "@server/models/site";
import { presentLoad, rounded } from "@server/presenters/present-energy";
import { energyBlockedBy } from "@server/presenters/present-loop";
import { currentBores } from "@server/queries/current-bores";
import { loadOf, registerOf } from "@server/queries/energy/loads";
import { loadFigureEvidences, type FigureEvidence } from "@server/queries/workings/figure-evidence";
import { plusMinusOf } from "@server/queries/workings/figure-uncertainty";
import { balanceFindings } from "./balance-findings";
import { importFindings } from "./import-findings";
import { readingFindings, siteSilence, type Finding } from "./reading-findings";
import { siteLoops, type SiteLoop } from "./site-loops";

const weights = ["stop", "look", "note"] as const;

/** What needs a look at a site, and how each loop ran on the last whole day. */
export async function siteToday(
  context: { scope: Scope; database: Database },
  site: Site,
  nowMs: number,
): Promise<TodayAnswer> {
  const { scope } = context;
  const { day, loops } = await siteLoops(context, site);
  const points = loops.flatMap(({ point }) => (point ? [point.id] : []));
  const [bores, findings, evidence] = await Promise.all([
    currentBores(scope, points),
    allFindings(context, site, loops, day, nowMs),
    evidenceOfDay(scope, site, loops, day),
  ]);
  return {
    site: { id: site.id, name: site.name, zone: site.zone, isDemo: site.isDemo },
    now: instantText(new Date(nowMs)),
    today: localDateOf(nowMs, site.zone),
    needsALook: findings,
    day,
    loops: loops.map((siteLoop) => ({
      loop: {
        id: siteLoop.loop.id,
        tag: siteLoop.loop.tag,
        name: siteLoop.loop.name,
        service: siteLoop.loop.service,
        buildingName: siteLoop.buildingName,
        isMain: siteLoop.isMain,
      },
      pointId: siteLoop.point?.id ?? null,
      nominalSizeDn: (siteLoop.point && bores.get(siteLoop.point.id)?.dn) ?? null,
      meterSide: siteLoop.point?.meterSide ?? null,
      ...presentDay(siteLoop, day, site.zone, evidence.get(siteLoop.point?.id ?? "")),
      lastReadingAt:
        siteLoop.readings?.lastMs == null ? null : instantText(new Date(siteLoop.readings.lastMs)),
    })),
  };
}

async function allFindings(
  context: { scope: Scope; database: Database },
  site: Site,
  loops: readonly SiteLoop[],
  day: string | null,
  nowMs: number,
): Promise<Finding[]> {
  const { database } = context;
  const imports = await importFindings(context, site.id, nowMs);
  const found = [...imports, ...siteSilence(loops, site.id, nowMs)];
  if (day !== null) {
    const when = { zone: site.zone, day, nowMs };
    const perLoop = await Promise.all(loops.map((one) => readingFindings(database, one, when)));
    found.push(...perLoop.flat(), ...(await balanceFindings(database, loops, when)));
  }
  return found.sort((a, b) => weights.indexOf(a.weight) - weights.indexOf(b.weight));
}

/** The evidence of every loop's point on the day shown. */
async function evidenceOfDay(
  scope: Scope,
  site: Site,
  loops: readonly SiteLoop[],
  day: string | null,
): Promise<Map<string, FigureEvidence>> {
  if (day === null) return new Map();
  const points = loops.flatMap(({ point, loop, readings }) =>
    point
      ? [
          {
            point,
            loop,
            site,
            nominalStepMs: readings?.nominalStepMs ?? null,
            held: { firstMs: readings?.firstMs ?? null, lastMs: readings?.lastMs ?? null },
          },
        ]
      : [],
  );
  return loadFigureEvidences(scope, points, localDay(day, site.zone));
}

type DayAnswer = Pick<
  TodayAnswer["loops"][number],
  "card" | "energyKwh" | "energyPlusMinus" | "emptyReason"
>;

function presentDay(
  { loop, point, readings, week }: SiteLoop,
  day: string | null,
  zone: string,
  evidence: FigureEvidence | undefined,
) {
  const empty = (emptyReason: DayAnswer["emptyReason"]): DayAnswer => ({
    card: null,
    energyKwh: null,
    energyPlusMinus: null,
    emptyReason,
  });
  if (!point) return empty("noPoint");
  if (!readings || readings.rowCount === 0 || day === null) return empty("noReadings");
  const block = energyBlockedBy(loop);
  if (block) return empty(block);
  const found = week.find(({ date }) => date === day);
  if (!found) return empty("noReadingsThatDay");
  const register = registerOf(loop.service, found.totals);
  const load = loadOf(localDay(day, zone), found.totals, register);
  if (!load) return empty("noReadingInFile");
  const rows = [found];
  const of = (figure: "power" | "energy") =>
    evidence ? plusMinusOf(evidence, rows, { figure, register }) : null;
  return {
    card: presentLoad(load, of("power")),
    energyKwh: rounded(found.totals[register].energyKwh, 4),
    energyPlusMinus: of("energy"),
    emptyReason: null,
  } satisfies DayAnswer;
}
