import { Readable } from "node:stream";
import { durationCurve } from "@shared/domain/analysis/duration-curve";
import { localDateOf } from "@shared/domain/time/local-calendar";
import { FileAnswer } from "@server/http/file-answer";
import { csvFileName, csvRecord, numberCell, textCell } from "@server/queries/energy/csv-cells";
import type { EnergyPoint } from "@server/queries/energy/energy-point";
import type { EnergyRange } from "@server/queries/energy/energy-range";
import type { RangeLoad } from "./load-shape";

// A byte order mark: without it spreadsheets read another encoding.
const byteOrderMark = "\uFEFF";

/** The whole duration curve, a row a step, from most power to least. */
export function durationCsv(
  { loop, point, site }: EnergyPoint,
  range: EnergyRange,
  { register, steps }: RangeLoad,
): FileAnswer {
  const names = [textCell(loop.tag), textCell(point.code)];
  const word = register === "heating" ? "Heating" : "Cooling";
  const head = ["Loop", "Point", "Hours at or above (h)", `${word} power (kW)`];
  const records = durationCurve(steps).map(({ hours, powerKw }) =>
    csvRecord([...names, numberCell(hours, 4), numberCell(powerKw, 4)]),
  );
  const dates = [range.startMs, range.endMs - 1].map((ms) => localDateOf(ms, site.zone));
  const [from = "", last = ""] = dates;
  return new FileAnswer({
    name: csvFileName([loop.tag, point.code, "duration-curve", from, "to", last]),
    contentType: "text/csv; charset=utf-8",
    body: Readable.from([byteOrderMark + csvRecord(head), records.join("")], { objectMode: false }),
  });
}
