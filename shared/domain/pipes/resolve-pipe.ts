import { boreMm } from "./bore";
import { PIPE_TABLES, pipeSize, pipeTable } from "./pipe-tables";

/** A pipe as somebody says it: a size of a standard table, or diameters measured on the pipe. */
export type PipeChoice =
  | { readonly kind: "table"; readonly tableId: string; readonly dn: number }
  | {
      readonly kind: "measured";
      readonly outsideDiameterMm: number;
      readonly wallMm: number;
      readonly liningMm: number;
      readonly material: string | null;
    };

export interface PipeDimensions {
  readonly outsideDiameterMm: number;
  readonly wallMm: number;
  readonly liningMm: number;
  readonly insideDiameterMm: number;
  readonly material: string | null;
}

export type ResolvedPipe =
  | { readonly ok: true; readonly dimensions: PipeDimensions }
  | {
      readonly ok: false;
      readonly code: "noSuchTable" | "noSuchSize" | "noBoreLeft";
      /** The part of the choice that is wrong. */
      readonly field: "tableId" | "dn" | "wallMm" | "liningMm";
    };

/**
 * Dimensions of a pipe in mm, or what is wrong with the choice.
 * Example: ("asme-b36.10m-40", 100) → outside 114.3, wall 6.02, bore 102.26 (ASME B36.10M).
 */
export function resolvePipe(choice: PipeChoice): ResolvedPipe {
  if (choice.kind === "measured") {
    const { outsideDiameterMm, wallMm, liningMm, material } = choice;
    const insideDiameterMm = boreMm(outsideDiameterMm, wallMm, liningMm);
    if (insideDiameterMm === null) {
      const field = boreMm(outsideDiameterMm, wallMm) === null ? "wallMm" : "liningMm";
      return { ok: false, code: "noBoreLeft", field };
    }
    return {
      ok: true,
      dimensions: { outsideDiameterMm, wallMm, liningMm, insideDiameterMm, material },
    };
  }
  const table = pipeTable(choice.tableId);
  if (table === null) return { ok: false, code: "noSuchTable", field: "tableId" };
  const size = pipeSize(choice.tableId, choice.dn);
  if (size === null) return { ok: false, code: "noSuchSize", field: "dn" };
  const { outsideDiameterMm, wallMm, liningMm } = size;
  const dimensions = {
    outsideDiameterMm,
    wallMm,
    liningMm,
    insideDiameterMm: size.boreMm,
    material: table.material,
  };
  return { ok: true, dimensions };
}

/** "DN 100, carbon steel" where a table names the size, else "114.3 × 4.5 mm, steel". */
export function pipeLabel(choice: PipeChoice, dimensions: PipeDimensions): string {
  const size =
    choice.kind === "table"
      ? `DN ${choice.dn}`
      : `${dimensions.outsideDiameterMm} × ${dimensions.wallMm} mm`;
  return dimensions.material === null ? size : `${size}, ${dimensions.material}`;
}

const STEEL = "asme-b36.10m-std";

/** The nominal size of steel pipe nearest to an outside diameter in mm: how bold to draw it. */
export function nearestNominalSizeDn(outsideDiameterMm: number): number {
  const sizes = (pipeTable(STEEL) ?? PIPE_TABLES[0])?.sizes ?? [];
  let nearest = 0;
  let least = Infinity;
  for (const { dn, outsideDiameterMm: size } of sizes) {
    const difference = Math.abs(size - outsideDiameterMm);
    if (difference < least) {
      nearest = dn;
      least = difference;
    }
  }
  return nearest;
}
