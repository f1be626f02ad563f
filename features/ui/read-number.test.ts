import { readTypedNumber } from "./read-number";

const value = (typed: string, grouping: "," | "." | null = null) => {
  const read = readTypedNumber(typed, grouping);
  return read.kind === "number" ? read.value : read.kind;
};

describe("a typed number", () => {
  it("takes comma or point as the decimal mark", () => {
    expect(value("18,42", ",")).toBe(18.42);
    expect(value("18.42", ".")).toBe(18.42);
    expect(value("0,125", ",")).toBe(0.125);
  });

  it("takes thousands when the marks say so", () => {
    expect(value("1,234.5")).toBe(1234.5);
    expect(value("1.234,5")).toBe(1234.5);
    expect(value("1 234,5")).toBe(1234.5);
    expect(value("1,234,567")).toBe(1234567);
  });

  it("refuses what could be a thousand times something else", () => {
    expect(value("1,234", ",")).toBe("unreadable");
    expect(value("1.234", ".")).toBe("unreadable");
    expect(value("1.234", ",")).toBe(1.234);
  });

  it("takes the true minus sign and refuses words, bad groups and exponents", () => {
    expect(value("\u22123,5")).toBe(-3.5);
    expect(value("12,34.5")).toBe("unreadable");
    expect(value("1.2.3,4")).toBe("unreadable");
    expect(value("12 bar")).toBe("unreadable");
    expect(value("1e3")).toBe("unreadable");
    expect(value("-")).toBe("unreadable");
  });

  it("is empty, not 0, when nothing is typed", () => {
    expect(value("  ")).toBe("empty");
  });
});
