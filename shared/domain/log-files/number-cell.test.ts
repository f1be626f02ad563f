import cells from "@test/fixtures/import-cells.json";
import { Random } from "@test/generators/random";
import { CellStatus, NumberCell, plainNumberText } from "./number-cell";
import type { DecimalMark } from "./recipe";
import { findRepeatedExtremes, isNumericSentinel, isSentinelToken } from "./sentinels";

const encoder = new TextEncoder();

function read(text: string, mark: DecimalMark): NumberCell {
  const cell = new NumberCell();
  const bytes = encoder.encode(text);
  cell.parse(bytes, 0, bytes.length, mark);
  return cell;
}

describe("a number in a cell", () => {
  it.each([
    ["B03", "1.234,5", ",", 1234.5],
    ["B04", "1\u202f234,5", ",", 1234.5],
    ["B05", "1,234.5", ".", 1234.5],
  ] as const)("reads %s", (id, text, mark, value) => {
    const cell = (cells as readonly { id: string; value?: unknown }[]).find(
      (other) => other.id === id,
    );
    expect(cell?.value).toBe(value);
    expect(read(text, mark)).toMatchObject({ status: CellStatus.number, value, decimals: 1 });
  });

  it("equals Number(text) to the last bit for any digits, decimals, sign and exponent", () => {
    const random = new Random(11);
    const wrong: string[] = [];
    for (let i = 0; i < 20_000; i++) {
      const whole = String(random.whole(0, 10 ** random.whole(0, 12)));
      const fraction = Array.from({ length: random.whole(0, 12) }, () => random.whole(0, 9)).join(
        "",
      );
      const exponent = random.chance(0.1)
        ? `E${random.pick(["", "-", "+"])}${random.whole(0, 12)}`
        : "";
      const text = `${random.pick(["", "-", "+"])}${whole}${fraction === "" ? "" : `.${fraction}`}${exponent}`;
      const withComma = text.replace(".", ",");
      if (!Object.is(read(text, ".").value, Number(text))) wrong.push(text);
      if (!Object.is(read(withComma, ",").value, Number(text))) wrong.push(withComma);
    }
    expect(wrong).toEqual([]);
  });

  it("never guesses at groups that are not of three, or at the other mark", () => {
    for (const [text, mark] of [
      ["6,7", "."],
      ["1.23", ","],
      ["12.34.567", ","],
      ["1,23,456", "."],
      ["6,7 2", ","],
      ["1'2", "."],
      ["0x10", "."],
      ["1e5000", "."],
      ["6.7m", "."],
      ["=1+1", "."],
      ["Infinityx", "."],
    ] as const) {
      expect([text, read(text, mark).status]).toEqual([text, CellStatus.unreadable]);
      expect(plainNumberText(text, mark)).toBeNull();
    }
  });
});

describe("no reading", () => {
  it("is known by word or number in any case and sign, and zero is a reading", () => {
    for (const token of [
      "OL",
      "Overrange",
      "+OL",
      "---",
      "--.-",
      "#N/A",
      "nan",
      "NULL",
      "no data",
      "Err",
      "keine Daten",
    ]) {
      expect([token, isSentinelToken(token), read(token, ".").status]).toEqual([
        token,
        true,
        CellStatus.token,
      ]);
    }
    for (const value of [-9999, -999.9, 9.9e37, -9.9e37])
      expect(isNumericSentinel(value)).toBe(true);
    for (const value of [0, -31.2, 999, 9999, 850]) expect(isNumericSentinel(value)).toBe(false);
    // Firmware writes it with a point even beside decimal commas.
    expect(read("-999.9", ",").status).toBe(CellStatus.token);
  });

  it("is a repeated end stop far from all other values, but never a stopped pump or a steady reading", () => {
    const anything = { min: -Infinity, max: Infinity };
    expect(
      findRepeatedExtremes(Float64Array.of(6.1, 3276.7, 6.2, 3276.7, 6.3, 3276.7), anything),
    ).toEqual([3276.7]);
    expect(findRepeatedExtremes(Float64Array.of(29.9, 0, 30, 0, 30.1, 0), anything)).toEqual([]);
    expect(findRepeatedExtremes(Float64Array.of(990, 999, 985, 999, 970, 999), anything)).toEqual(
      [],
    );
    // 850 °C is no end stop of digits, but no loop is that hot.
    expect(
      findRepeatedExtremes(Float64Array.of(6.1, 850, 6.2, 850, 850), { min: -60, max: 400 }),
    ).toEqual([850]);
  });
});
