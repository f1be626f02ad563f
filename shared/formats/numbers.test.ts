import { formatFigure, formatNumber, uncertaintyPlaces } from "./numbers";

// Two significant figures of the ± and the value to the same place: the guide to the expression of
// uncertainty (JCGM 100:2008, 7.2.6). Values from common practice, worked by hand.
describe("a figure with its ±", () => {
  it.each([
    [14938.7, 498.7, "14,940", "500"],
    [186.61, 5.36, "186.6", "5.4"],
    [4.8712, 0.1312, "4.87", "0.13"],
    [4480.2, 99.7, "4,480", "100"],
    [51.83, 0.996, "51.8", "1.0"],
    [0.5, 1370, "0", "1,400"],
  ])("%p ± %p reads %s ± %s", (value, uncertainty, shown, shownUncertainty) => {
    expect(formatFigure(value, uncertainty, "en")).toEqual({
      value: shown,
      uncertainty: shownUncertainty,
    });
  });

  it("has no ± where none is worked out, and no places made up", () => {
    expect(uncertaintyPlaces(null)).toBeNull();
    expect(uncertaintyPlaces(0)).toBeNull();
    expect(formatFigure(18.4, null, "en", 2)).toEqual({ value: "18.40", uncertainty: null });
  });

  it("shows unknown as a dash, never as 0", () => {
    expect(formatFigure(null, 5, "en")).toEqual({ value: "—", uncertainty: null });
    expect(formatNumber(Number.NaN, 1, "en")).toBe("—");
  });
});

describe("a number on screen", () => {
  it("follows the language and uses the true minus sign", () => {
    expect(formatNumber(-12345.678, 1, "en")).toBe("\u221212,345.7");
    expect(formatNumber(-12345.678, 1, "de")).toBe("\u221212.345,7");
  });

  it("has no sign when it rounds to nothing", () => {
    expect(formatNumber(-0.04, 1, "en")).toBe("0.0");
  });
});
