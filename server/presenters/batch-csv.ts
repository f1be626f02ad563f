import type { BatchDetail, BatchFile } from "@shared/contracts/import-batches";
import { FileAnswer } from "@server/http/file-answer";
import { csvFileName, csvRecord, numberCell, textCell } from "@server/queries/energy/csv-cells";

// A byte order mark: without it spreadsheets read ± and umlauts as another encoding.
const byteOrderMark = "\uFEFF";
const decimals = 6;

const head = [
  "File",
  "Loop",
  "Point",
  "Point found by",
  "Logger serial",
  "State",
  "Rows read",
  "Rows used",
  "Rows left out",
  "Rows excluded",
  "Rows without reading",
  "From (UTC)",
  "To (UTC)",
  "Heating, kWh",
  "Heating, expanded uncertainty k = 2, kWh",
  "Cooling, kWh",
  "Cooling, expanded uncertainty k = 2, kWh",
  "Problems",
  "Import",
];

/** A batch's report as CSV, one file a record: for a machine, in English, SI units and UTC. */
export function batchCsv(batch: BatchDetail): FileAnswer {
  return new FileAnswer({
    name: csvFileName([batch.site.name, "files", batch.recipe.name, batch.createdAt.slice(0, 10)]),
    contentType: "text/csv; charset=utf-8",
    body: byteOrderMark + [head, ...batch.files.map(record)].map(csvRecord).join(""),
  });
}

function record(file: BatchFile): string[] {
  const { rows, heating, cooling } = file;
  const number = (value: number | null | undefined) => numberCell(value ?? null, decimals);
  return [
    textCell(file.name),
    textCell(file.point?.loopTag ?? ""),
    textCell(file.point?.code ?? ""),
    file.pointBy ?? "",
    textCell(file.loggerSerial ?? ""),
    file.state,
    number(rows?.read),
    number(rows?.used),
    number(rows?.leftOut),
    number(rows?.excluded),
    number(rows?.noReading),
    file.firstInstant ?? "",
    file.lastInstant ?? "",
    number(heating?.kwh),
    number(heating?.expandedKwh),
    number(cooling?.kwh),
    number(cooling?.expandedKwh),
    textCell(
      file.problems
        .map(({ code, count, detail }) =>
          [code, count, detail].filter((part) => part !== null).join(" "),
        )
        .join("; "),
    ),
    file.importId ?? "",
  ];
}
