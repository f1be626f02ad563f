import { Loop } from "@server/models/loop";
import { MeteringPoint } from "@server/models/metering-point";
import { Site } from "@server/models/site";
import type { TestApp } from "./test-app";

interface PlaceWishes {
  zone?: string;
  service?: "chilled" | "hot" | "changeover";
  meterSide?: "supply" | "return";
  fluidKind?: "water" | "propyleneGlycol";
  /** Instead of 30 % by mass. */
  glycolVolumePercent?: number;
  flowCutOffM3PerHour?: number | null;
  deltaTCutOffK?: number | null;
  designFlowM3PerHour?: number;
  designDeltaTK?: number;
}

let count = 0;

/** A site with one loop and one metering point; UTC, chilled water, meter on the return. */
export async function pointToMeter(
  app: TestApp,
  organisationId: string,
  wishes: PlaceWishes = {},
): Promise<{ site: Site; loop: Loop; point: MeteringPoint }> {
  count += 1;
  const createdAt = app.clock.date();
  const site = await Site.create({
    organisationId,
    name: `Site ${count}`,
    zone: wishes.zone ?? "UTC",
    currency: "EUR",
    createdAt,
  });
  const isWater = (wishes.fluidKind ?? "water") === "water";
  const loop = await Loop.create({
    organisationId,
    siteId: site.id,
    tag: `CHW-${count}`,
    name: `Loop ${count}`,
    service: wishes.service ?? "chilled",
    fluidKind: wishes.fluidKind ?? "water",
    glycolPercent: isWater ? null : (wishes.glycolVolumePercent ?? 30),
    glycolBasis: isWater ? null : wishes.glycolVolumePercent === undefined ? "mass" : "volume",
    flowCutOffM3PerHour: wishes.flowCutOffM3PerHour ?? null,
    deltaTCutOffK: wishes.deltaTCutOffK ?? null,
    designFlowM3PerHour: wishes.designFlowM3PerHour ?? null,
    designDeltaTK: wishes.designDeltaTK ?? null,
    createdAt,
  });
  const point = await MeteringPoint.create({
    organisationId,
    loopId: loop.id,
    code: `P-${count}`,
    name: `Point ${count}`,
    role: "main",
    meterSide: wishes.meterSide ?? "return",
    createdAt,
  });
  return { site, loop, point };
}
