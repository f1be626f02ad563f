import * as fc from "fast-check";
import { packNumbers, unpackNumbers } from "./packed-numbers";

describe("packed numbers", () => {
  // ECMA-426, section "Base64 VLQ": 0 is A, 1 is C, −1 is D, 16 is gB, 123 is 2H.
  it.each([
    [0, "A"],
    [1, "C"],
    [-1, "D"],
    [16, "gB"],
    [123, "2H"],
  ])("writes %d as the source map format does", (value, text) => {
    expect(packNumbers([value], 0).differences).toBe(text);
  });

  it("writes the example of its description", () => {
    const packed = packNumbers([6.4, 6.5, null, 6.4], 1);
    expect(packed).toEqual({ decimals: 1, differences: "gEC.D" });
    expect(unpackNumbers(packed)).toEqual(Float64Array.of(6.4, 6.5, NaN, 6.4));
  });

  it("gives every decimal number back to the bit, and NaN for what is unknown", () => {
    const whole = fc.integer({ min: -(2 ** 50), max: 2 ** 50 });
    const column = fc.array(fc.option(whole, { freq: 8 }));
    fc.assert(
      fc.property(column, fc.nat(9), (given, decimals) => {
        const values = given.map((n) => (n === null ? null : Number(`${n}e-${decimals}`)));
        const expected = Float64Array.from(values, (value) => value ?? NaN);
        expect(unpackNumbers(packNumbers(values, decimals))).toEqual(expected);
        expect(unpackNumbers(packNumbers(expected, decimals))).toEqual(expected);
      }),
    );
  });

  it("refuses what it did not write", () => {
    expect(() => unpackNumbers({ decimals: 0, differences: "A;" })).toThrow(RangeError);
    expect(() => unpackNumbers({ decimals: 0, differences: "Ag" })).toThrow(RangeError);
  });
});
