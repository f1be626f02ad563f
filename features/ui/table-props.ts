import type { ReactNode } from "react";

export interface TableFigure {
  value: number | null;
  uncertainty?: number | null;
  places?: number;
}

export interface Column<Row> {
  key: string;
  header: string;
  /** Unit in the head, once, instead of in every row. */
  unit?: string;
  align?: "left" | "right";
  width?: number;
  /** Left out on tablets, where a table has fewer columns. */
  wideOnly?: boolean;
  /** What the cell shows; text is set in the narrow face. */
  render?: (row: Row) => ReactNode;
  /** A figure: value right-aligned, its ± left-aligned beside it, so both line up down the column. */
  figure?: (row: Row) => TableFigure;
  /** A reading off an instrument or a file: mono. */
  asRead?: (row: Row) => string;
}

export interface RowCard<Row> {
  title: (row: Row) => ReactNode;
  figure?: (row: Row) => ReactNode;
  /** The rest, beneath; false and null are skipped. */
  lines?: (row: Row) => readonly ReactNode[];
}

export interface TableProps<Row> {
  /** Names the table; read before it. */
  caption: string;
  captionHidden?: boolean;
  columns: readonly Column<Row>[];
  rows: readonly Row[];
  rowKey: (row: Row) => string;
  /** Below 720 px each row becomes this card. */
  card: RowCard<Row>;
  /** Sum row under a 2 px ink rule. */
  total?: Row;
  totalLabel?: string;
  /** Makes the first cell (and the card) a link. */
  href?: (row: Row) => string | null;
  selectedKey?: string;
  onSelect?: (row: Row) => void;
  tone?: (row: Row) => "look" | "wrong" | null;
  twoLines?: boolean;
  /** Shown instead of rows when there are none. */
  empty?: ReactNode;
}
