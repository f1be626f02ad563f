import pipes from "../../data/pipes.json";

/** Nominal pipe dimensions by standard. Mill tolerance is ±10 % or more of the wall: measure it. */
export interface PipeTable {
  readonly id: string;
  readonly standard: string;
  /** Schedule, type or class. */
  readonly series: string;
  readonly material: string;
  /** Where the figures come from and how far they were checked. */
  readonly source: string;
  readonly basis: string;
  readonly sizes: readonly PipeSize[];
}

export interface PipeSize {
  /** Nominal size; tables of copper and plastic pipe are named by outside diameter. */
  readonly dn: number;
  /** Nominal size in inches where the standard has one. */
  readonly nps: number | null;
  readonly outsideDiameterMm: number;
  readonly wallMm: number;
  readonly liningMm: number;
  readonly boreMm: number;
}

interface PipeRow {
  readonly dn: number;
  readonly nps?: number;
  readonly od_mm: number;
  readonly wall_mm: number;
  readonly id_mm: number;
  readonly lining_mm?: number;
}

export const PIPE_TABLES: readonly PipeTable[] = pipes.tables.map((table) => ({
  id: table.id,
  standard: table.standard,
  series: table.series,
  material: table.material,
  source: table.source,
  basis: table.basis,
  sizes: (table.rows as readonly PipeRow[]).map((row) => ({
    dn: row.dn,
    nps: row.nps ?? null,
    outsideDiameterMm: row.od_mm,
    wallMm: row.wall_mm,
    liningMm: row.lining_mm ?? 0,
    boreMm: row.id_mm,
  })),
}));

const TABLE_BY_ID = new Map(PIPE_TABLES.map((table) => [table.id, table]));

export function pipeTable(tableId: string): PipeTable | null {
  return TABLE_BY_ID.get(tableId) ?? null;
}

/** The size `dn` of a table, e.g. `("asme-b36.10m-40", 100)`; null where the table has no such row. */
export function pipeSize(tableId: string, dn: number): PipeSize | null {
  return pipeTable(tableId)?.sizes.find((size) => size.dn === dn) ?? null;
}
