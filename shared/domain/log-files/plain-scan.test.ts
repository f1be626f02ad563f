import * as fc from "fast-check";
import { createFileScan, type ScanResult } from "./file-scan";
import { finishRecognition } from "./finish-recognition";
import { isUnreadable, recogniseHead, type HeadRecognition } from "./recognise-head";

const bytesOf = (text: string) => new TextEncoder().encode(text);

function headOf(text: string): HeadRecognition {
  const head = recogniseHead(bytesOf(text), true);
  if (isUnreadable(head)) throw new Error(head.code);
  return head;
}

function scanned(head: HeadRecognition, parts: readonly string[]): ScanResult {
  const scan = createFileScan(head);
  for (const part of parts) scan.push(bytesOf(part));
  return scan.end();
}

/** All that a scan says, as plain values. */
function said(head: HeadRecognition, result: ScanResult) {
  const { columns, time, ...rest } = result;
  return {
    ...rest,
    order: time.order(),
    halfDay: time.halfDayUnknown(),
    rows: time.rows,
    withOffset: time.withOffset,
    columns: columns.map((column) => ({
      numbers: column.numbers,
      empties: column.empties,
      texts: column.texts,
      tokens: [...column.tokens],
      proofs: [column.pointProof, column.commaProof, column.eitherPoint, column.eitherComma],
      ranges: [column.range("."), column.range(",")],
    })),
    recognition: finishRecognition(head, result),
  };
}

const two = (value: number) => String(value).padStart(2, "0");

interface Style {
  readonly separator: string;
  readonly mark: string;
  readonly end: string;
}

const dayTime = fc.record({
  day: fc.integer({ min: 1, max: 28 }),
  hour: fc.oneof({ weight: 9, arbitrary: fc.nat(23) }, { weight: 1, arbitrary: fc.constant(24) }),
  minute: fc.nat(59),
  second: fc.option(fc.nat(61), { freq: 3 }),
});
const cell = fc.oneof(
  { weight: 30, arbitrary: fc.tuple(fc.integer({ min: -2_000, max: 90_000 }), fc.nat(3)) },
  {
    weight: 1,
    arbitrary: fc.constantFrom("", "---", "OVER", "-9999", "1e3", " 6", "+7", "9999.9"),
  },
);
const row = fc.record({
  isNewDay: fc.oneof(
    { weight: 9, arbitrary: fc.constant(false) },
    { weight: 1, arbitrary: fc.constant(true) },
  ),
  at: dayTime,
  cells: fc.tuple(cell, cell),
  tail: fc.oneof(
    { weight: 30, arbitrary: fc.constant("") },
    { weight: 1, arbitrary: fc.constantFrom("Z", " PM") },
  ),
  width: fc.oneof(
    { weight: 30, arbitrary: fc.constant(3) },
    { weight: 1, arbitrary: fc.constantFrom(1, 2, 4) },
  ),
});

function logOf(
  rows: readonly (typeof row extends fc.Arbitrary<infer Row> ? Row : never)[],
  style: Style,
) {
  const { separator, mark, end } = style;
  let day = 1;
  const number = (given: string | [number, number]) =>
    typeof given === "string" ? given : (given[0] / 1000).toFixed(given[1]).replace(".", mark);
  const line = ({ isNewDay, at, cells, tail, width }: (typeof rows)[number]) => {
    if (isNewDay) day = at.day;
    const seconds = at.second === null ? "" : `:${two(at.second)}`;
    const time = `${two(day)}/07/2025 ${two(at.hour)}:${two(at.minute)}${seconds}${tail}`;
    return [time, ...cells.map(number), "5"].slice(0, width).join(separator) + end;
  };
  // Enough plain rows for the head to see how the file is written.
  const plain = Array.from(
    { length: 12 },
    (_, i) =>
      ["01/07/2025 00:" + two(i), "20.25", "6.40"].join(separator).replaceAll(".", mark) + end,
  );
  return (
    ["time", "flow m3/h", "supply °C"].join(separator) +
    end +
    plain.join("") +
    rows.map(line).join("")
  );
}

it("says of rows it need not look at whole what the careful way says of them", () => {
  const styles = fc.constantFrom<Style[]>(
    { separator: ",", mark: ".", end: "\n" },
    { separator: ";", mark: ",", end: "\r\n" },
    { separator: "\t", mark: ".", end: "\r\n" },
  );
  fc.assert(
    fc.property(
      fc.array(row, { minLength: 60, maxLength: 200, size: "max" }),
      styles,
      fc.nat(40),
      (rows, style, cut) => {
        const body = logOf(rows, style);
        const footer = `"end"${style.end}`;
        const head = headOf(body + footer);
        // A quote in a stretch of bytes sends all of it the careful way.
        const careful = said(head, scanned(head, [body + footer]));
        expect(said(head, scanned(head, [body, footer]))).toEqual(careful);
        const torn = [body.slice(0, -cut - 1), body.slice(-cut - 1), footer];
        expect(said(head, scanned(head, torn))).toEqual(careful);
      },
    ),
    { numRuns: 60 },
  );
});
