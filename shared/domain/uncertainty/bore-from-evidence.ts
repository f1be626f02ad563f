import { boreMm, outsideDiameterFromCircumferenceMm } from "../pipes/bore";
import { boreUncertaintyMm } from "../pipes/bore-uncertainty";
import type { PipeDimensions } from "../pipes/resolve-pipe";
import type { TermOrigin } from "./budget";
import { originOf } from "./budget-term";
import { standardFromHalfWidth } from "./distributions";
import type { PipeEvidence } from "./point-evidence";

/** The bore that turns speeds into flow, and how well it is known. */
export interface BoreFromEvidence {
  readonly boreMm: number;
  readonly outsideDiameterMm: number;
  readonly wallMeanMm: number;
  /** n − 1 in its denominator; null with one reading or none. */
  readonly wallDeviationMm: number | null;
  /** Standard. */
  readonly uncertaintyMm: number;
  readonly origin: TermOrigin;
}

export type NominalPipe = Pick<PipeDimensions, "outsideDiameterMm" | "wallMm" | "liningMm">;

/** Mill tolerances of steel pipe, half-widths, from memory of common pipe standards. */
export const WALL_TOLERANCE_PERCENT = 12.5;
export const OUTSIDE_TOLERANCE_PERCENT = 1;

/**
 * Bore from what was measured on the pipe, else from its nominal dimensions, mm.
 *
 * Measured: ID = OD − 2·mean wall − 2·lining, OD from the circumference where there is one, and
 * u(ID)² = u(OD)² + 4·(u_gauge² + s²/n). With one wall reading its spread is unknown, and the mill
 * tolerance of the wall stands in. Nominal: wall ±12.5 % and outside diameter ±1 %, rectangles (from
 * memory), u(ID)² = u(OD)² + 4·u(wall)². The lining is taken as exact. Null where neither gives a bore.
 *
 * Example: 359.1 mm round, walls 5.62, 5.71, 5.66, 5.69, u 0.2 and 0.05 mm → 102.9651 ± 0.2270 mm (standard).
 */
export function boreFromEvidence(
  measured: PipeEvidence | null,
  nominal: NominalPipe | null,
): BoreFromEvidence | null {
  return (measured && boreAsMeasured(measured)) ?? (nominal && boreOfTable(nominal));
}

function boreAsMeasured(pipe: PipeEvidence): BoreFromEvidence | null {
  const outsideDiameterMm =
    pipe.circumferenceMm === null
      ? pipe.outsideDiameterMm
      : outsideDiameterFromCircumferenceMm(pipe.circumferenceMm);
  const walls = pipe.wallReadingsMm;
  if (outsideDiameterMm === null || walls.length === 0) return null;
  const wallMeanMm = walls.reduce((sum, wall) => sum + wall, 0) / walls.length;
  const bore = boreMm(outsideDiameterMm, wallMeanMm, pipe.liningMm);
  if (bore === null) return null;
  const ofSeveral = boreUncertaintyMm(
    pipe.outsideDiameterUncertaintyMm,
    pipe.gaugeUncertaintyMm,
    walls,
  );
  const values = { outsideDiameterMm, wallMeanMm, boreMm: bore };
  const known = { boreMm: bore, outsideDiameterMm, wallMeanMm };
  if (ofSeveral === null) {
    const wall = standardFromHalfWidth((WALL_TOLERANCE_PERCENT / 100) * wallMeanMm);
    return {
      ...known,
      wallDeviationMm: null,
      uncertaintyMm: Math.hypot(
        pipe.outsideDiameterUncertaintyMm,
        2 * pipe.gaugeUncertaintyMm,
        2 * wall,
      ),
      origin: originOf("evidence", "boreOneWallReading", {
        ...values,
        wallTolerancePercent: WALL_TOLERANCE_PERCENT,
      }),
    };
  }
  const squares = walls.reduce((sum, wall) => sum + (wall - wallMeanMm) ** 2, 0);
  return {
    ...known,
    wallDeviationMm: Math.sqrt(squares / (walls.length - 1)),
    uncertaintyMm: ofSeveral,
    origin: originOf("evidence", "boreMeasured", { ...values, wallReadings: walls.length }),
  };
}

function boreOfTable(pipe: NominalPipe): BoreFromEvidence | null {
  const bore = boreMm(pipe.outsideDiameterMm, pipe.wallMm, pipe.liningMm);
  if (bore === null) return null;
  const outside = standardFromHalfWidth((OUTSIDE_TOLERANCE_PERCENT / 100) * pipe.outsideDiameterMm);
  const wall = standardFromHalfWidth((WALL_TOLERANCE_PERCENT / 100) * pipe.wallMm);
  return {
    boreMm: bore,
    outsideDiameterMm: pipe.outsideDiameterMm,
    wallMeanMm: pipe.wallMm,
    wallDeviationMm: null,
    uncertaintyMm: Math.hypot(outside, 2 * wall),
    origin: originOf("default", "boreFromTable", {
      boreMm: bore,
      wallTolerancePercent: WALL_TOLERANCE_PERCENT,
      outsideTolerancePercent: OUTSIDE_TOLERANCE_PERCENT,
    }),
  };
}
