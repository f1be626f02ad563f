import type { ReadingSegment } from "@shared/domain/readings/reading-columns";

/** A series as the text of a log in UTC, ISO times, m³/h and °C unless told otherwise. */
export function logOf(
  { columns }: Pick<ReadingSegment, "columns">,
  wishes: {
    readonly flowHeader?: string;
    readonly temperatureUnit?: string;
    readonly only?: "flow" | "temperatures";
  } = {},
): string {
  const { instantMs, flowM3PerHour, supplyC, returnC } = columns;
  const { flowHeader = "flow m3/h", temperatureUnit = "°C", only } = wishes;
  const cell = (values: Float64Array | null, row: number) => {
    const value = values?.[row];
    return value === undefined || Number.isNaN(value) ? "" : value.toFixed(2);
  };
  const named = [
    ...(only === "temperatures" ? [] : [{ header: flowHeader, values: flowM3PerHour }]),
    ...(only === "flow"
      ? []
      : [
          { header: `supply ${temperatureUnit}`, values: supplyC },
          { header: `return ${temperatureUnit}`, values: returnC },
        ]),
  ];
  const lines = Array.from(instantMs, (ms, row) =>
    [new Date(ms).toISOString(), ...named.map(({ values }) => cell(values, row))].join(","),
  );
  return [["time", ...named.map(({ header }) => header)].join(","), ...lines, ""].join("\n");
}
