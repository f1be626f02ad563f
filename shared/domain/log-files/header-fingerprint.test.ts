import { headerFingerprint, normalHeader } from "./header-fingerprint";

const columns = (...headers: string[]) => headers.map((header, index) => ({ index, header }));
const plain = { unitsLine: null };

it("is the count of columns, their names and the units row", () => {
  expect(headerFingerprint(columns("Time", "Flow [L/s]"), 2, plain, [])).toBe("2|time|flow [l/s]|");
});

it("is the same whatever separator, spacing, case or line the header has", () => {
  const first = headerFingerprint(columns("Time", "Flow"), 2, { unitsLine: 2 }, [
    "Time;Flow",
    ";L/s",
  ]);
  const second = headerFingerprint(columns("TIME ", " flow"), 2, { unitsLine: 3 }, [
    "Site\tNorth",
    "Time\tFlow",
    "\tL/s",
  ]);
  expect(second).toBe(first);
});

it("is the same for another logger whose serial number stands in the header", () => {
  const of = (serial: string) =>
    headerFingerprint(columns("Time", `Temp (S/N ${serial})`), 2, plain, []);
  expect(of("20714455")).toBe(of("20719902"));
});

it.each([
  ["another unit in the units row", columns("Time", "Flow"), 2, [";L/min"]],
  ["another name", columns("Time", "Flow 2"), 2, [";L/s"]],
  ["one more column", columns("Time", "Flow"), 3, [";L/s"]],
])("differs with %s", (_, given, count, lines) => {
  const own = headerFingerprint(columns("Time", "Flow"), 2, { unitsLine: 1 }, [";L/s"]);
  expect(headerFingerprint(given, count, { unitsLine: 1 }, lines)).not.toBe(own);
});

it("is none without a header: every such file would look alike", () => {
  expect(headerFingerprint(columns("", ""), 2, plain, [])).toBeNull();
});

it("keeps short numbers, which tell columns apart", () => {
  expect(normalHeader("T 1")).not.toBe(normalHeader("T 2"));
});
