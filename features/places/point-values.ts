import type { z } from "zod";
import type { gapRule, meterSide, Pipe, Point, pointRole } from "@shared/contracts/places";
import { resolvePipe, type ResolvedPipe } from "@shared/domain/pipes/resolve-pipe";
import type { Format } from "@features/i18n";
import { NONE } from "./loop-values";
import { shownValue, storedValue } from "./shown-range";

export type PointRole = z.infer<typeof pointRole>;
export type MeterSide = z.infer<typeof meterSide>;
export type GapRule = z.infer<typeof gapRule>;

/** A point's fields as typed: diameters in the unit shown, null while empty. */
export interface PointValues {
  readonly code: string;
  readonly name: string;
  readonly role: PointRole | null;
  readonly parentPointId: string;
  /** Null until somebody chooses: the wrong side is an error of several per cent nobody sees. */
  readonly meterSide: MeterSide | null;
  readonly gapRule: GapRule;
  readonly pipeKind: "table" | "measured" | "unknown";
  readonly tableId: string | null;
  readonly dn: number | null;
  readonly outsideDiameter: number | null;
  readonly wall: number | null;
  readonly lining: number | null;
  readonly material: string;
  readonly notes: string;
}

export function pointValues(point: Point | null, format: Format): PointValues {
  const pipe = point?.pipe ?? null;
  const measured = pipe?.kind === "measured" ? pipe : null;
  const table = pipe?.kind === "table" ? pipe : null;
  const shown = (mm: number | undefined) => shownValue(format, "pipeSize", mm ?? null);
  return {
    code: point?.code ?? "",
    name: point?.name ?? "",
    role: point?.role ?? null,
    parentPointId: point?.parentPointId ?? NONE,
    meterSide: point?.meterSide ?? null,
    gapRule: point?.gapRule ?? "survey",
    pipeKind: pipe?.kind ?? (point ? "unknown" : "table"),
    tableId: table?.tableId ?? null,
    dn: table?.dn ?? null,
    outsideDiameter: shown(measured?.outsideDiameterMm),
    wall: shown(measured?.wallMm),
    lining: shown(measured?.liningMm ?? 0),
    material: measured?.material ?? "",
    notes: point?.notes ?? "",
  };
}

/** The pipe as typed; null while parts of it are missing, or where it is said to be unknown. */
export function pipeOf(values: PointValues, point: Point | null, format: Format): Pipe | null {
  if (values.pipeKind === "unknown") return null;
  if (values.pipeKind === "table")
    return values.tableId === null || values.dn === null
      ? null
      : { kind: "table", tableId: values.tableId, dn: values.dn };
  const before = point?.pipe?.kind === "measured" ? point.pipe : null;
  const mm = (typed: number | null, stored: number | undefined) =>
    storedValue(format, "pipeSize", typed, stored ?? null);
  const outsideDiameterMm = mm(values.outsideDiameter, before?.outsideDiameterMm);
  const wallMm = mm(values.wall, before?.wallMm);
  if (outsideDiameterMm === null || wallMm === null) return null;
  return {
    kind: "measured",
    outsideDiameterMm,
    wallMm,
    liningMm: mm(values.lining, before?.liningMm) ?? 0,
    material: values.material.trim() || null,
  };
}

/** Dimensions of the pipe as typed, or what is wrong with it; null while there is none. */
export function resolvedPipe(pipe: Pipe | null): ResolvedPipe | null {
  return pipe === null ? null : resolvePipe(pipe);
}

/** Points that may feed this one: of the loop, in use, and not fed by it. */
export function possibleFeeders(points: readonly Point[], pointId: string | null): Point[] {
  const below = new Set<string>(pointId === null ? [] : [pointId]);
  for (let grew = true; grew;) {
    grew = false;
    for (const point of points) {
      if (point.parentPointId !== null && below.has(point.parentPointId) && !below.has(point.id)) {
        below.add(point.id);
        grew = true;
      }
    }
  }
  return points.filter((point) => !below.has(point.id) && point.archivedAt === null);
}
