import type { z } from "zod";
import type { createBuilding, createLoop, createPoint, createSite } from "@shared/contracts/places";

/**
 * Harbour Court Works, the invented site of the demo: an energy centre that feeds three buildings
 * with chilled and hot water. Nothing here was measured anywhere.
 */
export interface DemoLoop {
  readonly buildingName: string;
  readonly parentTag: string | null;
  readonly loop: Omit<z.output<typeof createLoop.body>, "buildingId" | "parentLoopId">;
  readonly point: Omit<z.input<typeof createPoint.body>, "parentPointId">;
}

export const DEMO_SITE: z.input<typeof createSite.body> = {
  name: "Harbour Court Works",
  zone: "Europe/London",
  currency: "GBP",
  unitSystem: "si",
  address: "Invented site for trying things out",
};

export const DEMO_BUILDINGS: readonly z.input<typeof createBuilding.body>[] = [
  { name: "Chandlery", note: "2 zones" },
  { name: "Ropewalk House", note: "2 zones, level 4 plant room" },
  { name: "Net Loft", note: "1 zone, roof plant" },
  { name: "Energy centre", note: "Mains" },
];

const steelPipe = (dn: number) => ({ kind: "table", tableId: "en-10255-medium", dn }) as const;

function circuit(
  tag: string,
  buildingName: string,
  name: string,
  service: "chilled" | "hot",
  dn: number,
  design: { flowM3PerHour: number; deltaTK: number },
  parentTag: string | null,
): DemoLoop {
  return {
    buildingName,
    parentTag,
    loop: {
      tag,
      name,
      service,
      fluid: { kind: "water" },
      gaugePressureMPa: service === "chilled" ? 0.4 : 0.3,
      designFlowM3PerHour: design.flowM3PerHour,
      designDeltaTK: design.deltaTK,
    },
    point: {
      code: `${tag}-P1`,
      name: parentTag === null ? "Main, plant room" : "Branch, plant room",
      role: parentTag === null ? "main" : "branch",
      meterSide: "return",
      pipe: steelPipe(dn),
    },
  };
}

/** Mains first: a loop is made after the one that feeds it. */
export const DEMO_LOOPS: readonly DemoLoop[] = [
  circuit(
    "CHW-1",
    "Energy centre",
    "Main chilled water",
    "chilled",
    150,
    { flowM3PerHour: 110, deltaTK: 6 },
    null,
  ),
  circuit(
    "LTHW-1",
    "Energy centre",
    "Main hot water",
    "hot",
    100,
    { flowM3PerHour: 40, deltaTK: 12 },
    null,
  ),
  circuit(
    "CHW-1A",
    "Chandlery",
    "Chandlery chilled water",
    "chilled",
    80,
    { flowM3PerHour: 30, deltaTK: 6 },
    "CHW-1",
  ),
  circuit(
    "CHW-1B",
    "Ropewalk House",
    "Ropewalk House chilled water",
    "chilled",
    100,
    { flowM3PerHour: 50, deltaTK: 6 },
    "CHW-1",
  ),
  circuit(
    "CHW-1C",
    "Net Loft",
    "Net Loft chilled water",
    "chilled",
    65,
    { flowM3PerHour: 14, deltaTK: 6 },
    "CHW-1",
  ),
  circuit(
    "LTHW-2",
    "Ropewalk House",
    "Ropewalk House hot water",
    "hot",
    65,
    { flowM3PerHour: 16, deltaTK: 12 },
    "LTHW-1",
  ),
  circuit(
    "LTHW-3",
    "Chandlery",
    "Chandlery hot water",
    "hot",
    65,
    { flowM3PerHour: 12, deltaTK: 12 },
    "LTHW-1",
  ),
  circuit(
    "LTHW-4",
    "Net Loft",
    "Net Loft hot water",
    "hot",
    50,
    { flowM3PerHour: 9, deltaTK: 12 },
    "LTHW-1",
  ),
];
