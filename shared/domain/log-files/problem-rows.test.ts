import { createLogReader } from "./log-reader";
import { createProblemReader, type ProblemReason } from "./problem-rows";
import { DEFAULT_REPAIR_CHOICES, type FileRecipe, type RepairChoices } from "./recipe";
import { resolveRows } from "./resolve-rows";

const recipe: FileRecipe = {
  dialect: {
    encoding: "utf-8",
    separator: ",",
    quote: null,
    headerLine: 1,
    unitsLine: null,
    firstDataLine: 2,
  },
  columns: [
    { index: 0, header: "Time", meaning: "time", unit: null, decimalMark: "." },
    { index: 1, header: "Flow", meaning: "flow", unit: "L/s", decimalMark: "." },
    { index: 2, header: "Supply", meaning: "supply", unit: "degC", decimalMark: "." },
    { index: 3, header: "Signal", meaning: "signal", unit: "%", decimalMark: "." },
  ],
  time: { format: { kind: "calendar", order: "yearMonthDay" }, clock: { kind: "site" } },
  seriesKind: "instantaneous",
};
const choices: RepairChoices = {
  ...DEFAULT_REPAIR_CHOICES,
  conflictingRepeats: "keepFirst",
  weakSignal: "exclude",
};
const lines = [
  "Time,Flow,Supply,Signal",
  "2026-03-29 00:50,8.1,6.9,90",
  "2026-03-29 00:55,8x1,6.9,90",
  "2026-03-29 01:30,8.3,6.9,90",
  "2026-03-29 02:00,OL,,90",
  "2026-03-29 02:05,8.2,-9999,90",
  "2026-03-29 02:05,8.2,-9999,90",
  "2026-03-29 02:10,8.1,6.9,90",
  "2026-03-29 02:10,8.2,6.9,90",
  "2026-03-29 02:06,8.1,6.9,90",
  "2026-03-29 02:15,8.1,6.9,12",
  "2026-03-29 02:20,8.1,6.9,90,7",
  "29th of March,8.1,6.9,90",
  "2026-03-29 02:25,8.1",
  "2026-03-29 02:30,8.1,6.9,90",
  "End of log",
];

function problemsOf(text: string, most = 1000, made: RepairChoices = choices) {
  const reader = createProblemReader(recipe, most);
  reader.push(new TextEncoder().encode(text));
  return reader.end(made, "Europe/London");
}

const all: [number, ProblemReason, string | null, string | null][] = [
  [3, "unreadableCell", "Flow", "8x1"],
  [4, "missingHour", null, null],
  [5, "noReadingWord", "Flow", "OL"],
  [5, "emptyCell", "Supply", ""],
  [6, "noReadingNumber", "Supply", "-9999"],
  [7, "noReadingNumber", "Supply", "-9999"],
  [7, "identicalRepeat", null, null],
  [9, "conflictingRepeat", null, null],
  [11, "weakSignal", "Signal", "12"],
  [12, "longRow", null, "2026-03-29 02:20"],
  [13, "unreadableTime", "Time", "29th of March"],
  [14, "shortRow", null, "2026-03-29 02:25"],
  [16, "footer", null, "End of log"],
];

it("names every row that cannot be read, is left out or does not count, by line", () => {
  const { rows, count } = problemsOf(lines.join("\n"));
  expect(rows.map(({ line, reason, column, cell }) => [line, reason, column, cell])).toEqual(all);
  expect(count).toBe(all.length);
});

it("takes the rows that another choice leaves out", () => {
  const made: RepairChoices = { ...choices, outOfOrder: "leaveOut", weakSignal: "keep" };
  const reasons = problemsOf(lines.join("\n"), 1000, made).rows.map(({ line, reason }) => [
    line,
    reason,
  ]);
  expect(reasons).toContainEqual([10, "outOfOrder"]);
  expect(reasons.map(([, reason]) => reason)).not.toContain("weakSignal");
});

it("lists as many as asked for, the first ones, and counts them all", () => {
  const { rows, count } = problemsOf(lines.join("\n"), 4);
  expect(rows.map(({ line, reason }) => [line, reason])).toEqual(
    all.slice(0, 4).map(([line, reason]) => [line, reason]),
  );
  expect(count).toBe(all.length);
});

it("counts as the checks do, in a long file full of defects", () => {
  const text = ["Time,Flow,Supply,Signal"];
  for (let i = 0; i < 3000; i++) {
    const at = new Date(Date.UTC(2026, 5, 1) + (i % 7 === 3 ? i - 2 : i) * 60_000);
    const flow = i % 11 === 4 ? "?" : `8.${i % 10}`;
    text.push(`${at.toISOString().slice(0, 16).replace("T", " ")},${flow},6.9,90`);
  }
  const bytes = new TextEncoder().encode(text.join("\n"));
  const reader = createLogReader(recipe);
  reader.push(bytes);
  const { steps, counts } = resolveRows(reader.end(), recipe, choices, "Europe/London");
  const step = (code: string) => steps.find((other) => other.code === code)?.count ?? 0;
  const { rows } = problemsOf(text.join("\n"), 100_000);
  const reason = (code: ProblemReason) => rows.filter((row) => row.reason === code).length;
  expect(step("conflictingRepeats")).toBeGreaterThan(100);
  expect(step("unreadableCells") + step("sentinels")).toBeGreaterThan(100);
  expect(reason("unreadableCell")).toBe(step("unreadableCells"));
  expect(reason("conflictingRepeat")).toBe(step("conflictingRepeats"));
  expect(reason("identicalRepeat")).toBe(step("identicalRepeats"));
  expect(reason("conflictingRepeat") + reason("identicalRepeat")).toBe(counts.leftOut);
});

it("names nothing in a clean file, and only what reading tells while the clock is open", () => {
  expect(problemsOf([lines[0], lines[1], lines[14]].join("\n"))).toEqual({ rows: [], count: 0 });
  const open: FileRecipe = { ...recipe, time: { ...recipe.time, clock: null } };
  const reader = createProblemReader(open, 1000);
  reader.push(new TextEncoder().encode(lines.join("\n")));
  const reasons = reader.end(choices, "Europe/London").rows.map(({ reason }) => reason);
  expect(reasons).toContain("unreadableCell");
  expect(reasons).not.toContain("missingHour");
});
