import { Link } from "expo-router";
import { useEffect, useRef, useState, type CSSProperties, type ReactNode } from "react";

import { formatFigure, NO_BREAK_SPACE, useFormat } from "@features/i18n";

import { cssType } from "./primitives/css-type";
import { TableCards } from "./table-cards";
import type { Column, TableProps } from "./table-props";
import { typeScale, useBreakpoint, useTheme } from "./theme";

/** A real table, so screen readers know rows and columns; cards below 720 px. */
export function Table<Row>(props: TableProps<Row>) {
  const breakpoint = useBreakpoint();
  if (breakpoint === "phone") return <TableCards {...props} />;
  const columns =
    breakpoint === "wide" ? props.columns : props.columns.filter((column) => !column.wideOnly);
  return <WideTable {...props} columns={columns} />;
}

function WideTable<Row>(props: TableProps<Row>) {
  const { colour } = useTheme();
  const { columns, rows, rowKey } = props;
  const [box, overflows] = useOverflow();
  const scrolling = overflows ? { role: "region", "aria-label": props.caption, tabIndex: 0 } : {};
  const caption: CSSProperties = props.captionHidden
    ? { position: "absolute", width: 1, height: 1, overflow: "hidden", clipPath: "inset(50%)" }
    : {
        ...cssType(typeScale.heading),
        textAlign: "left",
        padding: `14px ${edge}px 4px`,
        color: colour.ink,
      };
  if (rows.length === 0 && props.empty) return <>{props.empty}</>;
  return (
    // A very wide table scrolls inside itself, with the keyboard too, instead of widening the page.
    <div ref={box} {...scrolling} style={{ overflowX: "auto", position: "relative" }}>
      <table
        style={{
          borderCollapse: "collapse",
          width: "100%",
          color: colour.ink,
          ...cssType(typeScale.table),
        }}
      >
        <caption style={caption}>{props.caption}</caption>
        <thead>
          <tr>
            {columns.map((column, index) => (
              <Head
                key={column.key}
                column={column}
                first={index === 0}
                last={index === columns.length - 1}
              />
            ))}
          </tr>
        </thead>
        <tbody>
          {rows.map((row) => (
            <BodyRow key={rowKey(row)} {...props} columns={columns} row={row} />
          ))}
        </tbody>
        {props.total ? (
          <tfoot>
            <BodyRow {...props} columns={columns} row={props.total} isTotal />
          </tfoot>
        ) : null}
      </table>
    </div>
  );
}

const edge = 16;

/** Whether a box is wider inside than outside: only then does it take part in the tab order. */
function useOverflow() {
  const box = useRef<HTMLDivElement>(null);
  const [overflows, setOverflows] = useState(false);
  useEffect(() => {
    const element = box.current;
    if (!element || typeof ResizeObserver === "undefined") return;
    const observer = new ResizeObserver(() =>
      setOverflows(element.scrollWidth > element.clientWidth + 1),
    );
    observer.observe(element);
    return () => observer.disconnect();
  }, []);
  return [box, overflows] as const;
}

function Head<Row>({
  column,
  first,
  last,
}: {
  column: Column<Row>;
  first: boolean;
  last: boolean;
}) {
  const { colour } = useTheme();
  return (
    <th
      scope="col"
      colSpan={column.figure ? 2 : 1}
      style={{
        ...cssType(typeScale.tableHead),
        color: colour.ink2,
        textAlign: column.figure ? "center" : (column.align ?? "left"),
        padding: "10px 10px 8px",
        paddingLeft: first ? edge : 10,
        paddingRight: last ? edge : 10,
        verticalAlign: "bottom",
        width: column.width,
      }}
    >
      {column.header}
      {column.unit ? (
        <span style={{ color: colour.ink3 }}>{`${NO_BREAK_SPACE}${column.unit}`}</span>
      ) : null}
    </th>
  );
}

function BodyRow<Row>(props: TableProps<Row> & { row: Row; isTotal?: boolean }) {
  const { colour } = useTheme();
  const { row, columns, isTotal } = props;
  const selected = !isTotal && props.selectedKey === props.rowKey(row);
  const tone = isTotal ? null : (props.tone?.(row) ?? null);
  const fill = selected
    ? colour.markTint
    : tone === "look"
      ? colour.brassFaint
      : tone === "wrong"
        ? colour.madderFaint
        : undefined;
  const select = props.onSelect && !isTotal ? () => props.onSelect?.(row) : undefined;
  return (
    <tr
      aria-selected={props.selectedKey === undefined || isTotal ? undefined : selected}
      onClick={select}
      style={{
        background: fill,
        cursor: select ? "pointer" : undefined,
        boxShadow: selected ? `inset 3px 0 0 ${colour.mark}` : undefined,
      }}
    >
      {columns.map((column, index) => {
        const cell: CSSProperties = {
          padding: "6px 10px",
          paddingLeft: index === 0 ? edge : 10,
          paddingRight: index === columns.length - 1 ? edge : 10,
          height: props.twoLines ? 64 : 40,
          boxSizing: "border-box",
          borderTop: isTotal ? `2px solid ${colour.ink}` : `1px solid ${colour.rule}`,
          textAlign: column.align ?? "left",
        };
        if (column.figure)
          return <FigureCells key={column.key} style={cell} figure={column.figure(row)} />;
        const content = cellContent(props, column, index === 0);
        return index === 0 ? (
          <th
            key={column.key}
            scope="row"
            style={{
              ...cssType(typeScale.table),
              ...cell,
              fontFamily: typeScale.tableHead.fontFamily,
            }}
          >
            {content}
          </th>
        ) : (
          <td
            key={column.key}
            style={column.asRead ? { ...cell, ...cssType(typeScale.asReadM) } : cell}
          >
            {content}
          </td>
        );
      })}
    </tr>
  );
}

function cellContent<Row>(
  props: TableProps<Row> & { row: Row; isTotal?: boolean },
  column: Column<Row>,
  first: boolean,
): ReactNode {
  const { row, isTotal } = props;
  if (first && isTotal && props.totalLabel) return props.totalLabel;
  const content = column.asRead ? column.asRead(row) : column.render?.(row);
  if (!first || isTotal) return content;
  const href = props.href?.(row) ?? null;
  if (href) return <RowLink href={href}>{content}</RowLink>;
  if (props.onSelect)
    return <SelectRow onSelect={() => props.onSelect?.(row)}>{content}</SelectRow>;
  return content;
}

function RowLink({ href, children }: { href: string; children: ReactNode }) {
  const { colour } = useTheme();
  return (
    <Link
      href={href}
      style={{
        ...typeScale.tableHead,
        fontSize: typeScale.table.fontSize,
        color: colour.mark,
        textDecorationLine: "underline",
      }}
    >
      {children}
    </Link>
  );
}

function SelectRow({ onSelect, children }: { onSelect: () => void; children: ReactNode }) {
  return (
    <button
      type="button"
      onClick={(event) => {
        event.stopPropagation();
        onSelect();
      }}
      style={{
        background: "transparent",
        border: 0,
        padding: 0,
        textAlign: "left",
        cursor: "pointer",
      }}
    >
      {children}
    </button>
  );
}

function FigureCells(props: {
  style: CSSProperties;
  figure: { value: number | null; uncertainty?: number | null; places?: number };
}) {
  const { colour } = useTheme();
  const { language } = useFormat();
  const { value, uncertainty = null, places } = props.figure;
  const text = formatFigure(value, uncertainty, language, places);
  return (
    <>
      <td
        style={{
          ...props.style,
          ...cssType(typeScale.figureS),
          textAlign: "right",
          paddingRight: 0,
          whiteSpace: "nowrap",
        }}
      >
        {text.value}
      </td>
      <td
        style={{
          ...props.style,
          ...cssType(typeScale.bodyWide),
          color: colour.ink3,
          textAlign: "left",
          paddingLeft: 5,
          whiteSpace: "nowrap",
        }}
      >
        {text.uncertainty === null ? null : `±${NO_BREAK_SPACE}${text.uncertainty}`}
      </td>
    </>
  );
}
