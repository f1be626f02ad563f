import { findPoint, type InstalledSerial } from "./find-point";

const points = [
  { id: "1", code: "P-1", loopTag: "CHW-2" },
  { id: "10", code: "P-10", loopTag: "CHW-2" },
  { id: "11", code: "P-1-A", loopTag: "CHW-2" },
  { id: "2", code: "Main", loopTag: "LTHW-1" },
  { id: "3", code: "Main", loopTag: "LTHW-2" },
];
const at = (pointId: string, endsMs: number | null = null): InstalledSerial => ({
  pointId,
  startsMs: 0,
  endsMs,
});
const byName = (name: string) => findPoint(name, [], points).pointId;

it("knows a file by where the instrument it names is installed, whatever the file is called", () => {
  expect(findPoint("P-10.csv", [at("1")], points)).toEqual({
    pointId: "1",
    by: "serial",
    ambiguous: false,
  });
});

it("takes where an instrument is now over where it was", () => {
  expect(findPoint("log.csv", [at("1", 5), at("10")], points).pointId).toBe("10");
  expect(findPoint("log.csv", [at("1", 5)], points).pointId).toBe("1");
});

it("asks where an instrument was at two points and is at none now", () => {
  const found = findPoint("log.csv", [at("1", 5), at("10", 9)], points);
  expect(found).toEqual({ pointId: null, by: null, ambiguous: true });
});

it("leaves out points of other sites", () => {
  expect(findPoint("log.csv", [at("99")], points).pointId).toBeNull();
});

it.each([
  ["P-1.csv", "1"],
  ["2026-04 p 1 week.csv", "1"],
  ["P_10.csv", "10"],
  ["north P-1-A.csv.gz", "11"],
  ["LTHW-2_main.txt", "3"],
])("finds the code in %s", (name, id) => {
  expect(byName(name)).toBe(id);
});

it.each(["P-11.csv", "log.csv", "map-1.csv", "main.txt"])("finds no single code in %s", (name) => {
  expect(byName(name)).toBeNull();
});

it("says when a name fits several points", () => {
  expect(findPoint("main.txt", [], points).ambiguous).toBe(true);
  expect(findPoint("log.txt", [], points).ambiguous).toBe(false);
});
