import i18next from "i18next";
import deWords from "../words/de/workings.json";
import enWords from "../words/en/workings.json";
import { makeFormat } from "../formats/format";
import type { Language } from "../formats/language";
import { ORIGIN_CODES } from "../domain/uncertainty/codes";
import { BUDGET_TERM_KINDS } from "../domain/uncertainty/point-evidence";
import { SAMPLE_WORKINGS } from "./sample-workings";
import { workingsText } from "./workings-text";
import type { Words } from "./words";

const instance = i18next.createInstance();
void instance.init({
  resources: { en: { workings: enWords }, de: { workings: deWords } },
  defaultNS: "workings",
  interpolation: { escapeValue: false },
  initAsync: false,
});
function textOf(language: Language, units: "si" | "inchPound" = "si") {
  const words: Words = (key, values) => String(instance.getFixedT(language)(key, values ?? {}));
  return workingsText(SAMPLE_WORKINGS, words, makeFormat(language, units, "Europe/London"));
}
const plain = (text: string) => text.replace(/\u00a0/g, " ");

describe("the workings of a figure in words", () => {
  it("name the figure, the loop and the week, and stop value and ± at the same place", () => {
    const text = textOf("en");
    expect(text.subject).toBe(
      "Cooling energy, CHW-1B, week 20, 11 May to 17 May 2026. At 95 %, k = 2.",
    );
    expect(text.figure).toEqual({ value: "14,940", uncertainty: "500", unit: "kWh" });
    expect(plain(text.budget?.times.value ?? "")).toBe("± 500 kWh, 3.3 %");
  });

  it("let a reader check the sum with a pencil, and say how far that is off", () => {
    const { byHand } = textOf("en");
    expect(plain(byHand?.sum ?? "")).toBe("2,630 m³ × 1.166 kWh/(m³·K) × 4.870 K = 14,930 kWh");
    expect(byHand?.note).toBe("0.07 % from the sum of rows");
  });

  it("give each term its size, where it comes from, and a bar against the largest", () => {
    const rows = textOf("en").budget?.rows ?? [];
    expect(rows.map(({ label, detail, percent }) => [label, plain(detail), percent])).toEqual([
      ["Probe pair", "u 0.060 K, TP-12a and TP-12b, same bath", "1.23 %"],
      ["Straight run", "±2.0 %, 8.9 bores after a bend", "1.15 %"],
    ]);
    expect(rows[0]?.share).toBe(1);
    expect(rows[1]?.share).toBeCloseTo(1.1547 / 1.232, 6);
  });

  it("list only the kinds of rows there are", () => {
    expect(textOf("en").rows.sentence).toBe("9,937 measured, 37 excluded, 106 missing");
  });

  it("name the band in which neither register of a changeover loop runs, and what it held back", () => {
    const cutOffs = {
      flowM3PerHour: 0.5,
      deltaTK: 0.5,
      suppressedKwh: 8.369,
      suppressedS: 15_300,
      separatesRegisters: true,
    };
    const model = { ...SAMPLE_WORKINGS, basis: { ...SAMPLE_WORKINGS.basis, cutOffs } };
    const words: Words = (key, values) => String(instance.getFixedT("en")(key, values ?? {}));
    const { basis } = workingsText(model, words, makeFormat("en", "si", "Europe/London"));
    const shown = basis.rows.map(({ label, value }) => `${label}: ${plain(value)}`);
    expect(shown).toContain("Changeover band: no register under 0.50 m³/h or 0.50 K");
    expect(shown).toContain("Held back: 8.37 kWh over 4 h 15 min");
  });

  it("read in German with German numbers", () => {
    const text = textOf("de");
    expect(text.subject).toBe(
      "Kältemenge, CHW-1B, Woche 20, 11. Mai bis 17. Mai 2026. Bei 95 %, k = 2.",
    );
    expect(text.figure).toEqual({ value: "14.940", uncertainty: "500", unit: "kWh" });
    expect(text.rows.sentence).toBe("9.937 gemessen, 37 ausgeschlossen, 106 fehlen");
  });

  // 14 938.7 kWh ÷ 3.51685 kW = 4247.7 ton-h; 498.7 ÷ 3.51685 = 141.8, so tens: 4250 ± 140.
  it("follow the units of the reader, and lead the sum by hand to them", () => {
    const text = textOf("en", "inchPound");
    expect(text.figure).toEqual({ value: "4,250", uncertainty: "140", unit: "ton-h" });
    expect(plain(text.byHand?.sum ?? "")).toMatch(/= 14,930 kWh = 4,245 ton-h$/);
  });

  it("hold a word for every term and every origin a budget can have", () => {
    for (const words of [enWords, deWords]) {
      expect(Object.keys(words.budget.term).sort()).toEqual([...BUDGET_TERM_KINDS].sort());
      expect(Object.keys(words.budget.origin).sort()).toEqual(Object.keys(ORIGIN_CODES).sort());
    }
  });

  it("fill in only values an origin has", () => {
    for (const words of [enWords, deWords]) {
      for (const [code, text] of Object.entries(words.budget.origin)) {
        const known: readonly string[] = ORIGIN_CODES[code as keyof typeof ORIGIN_CODES];
        const asked = [...text.matchAll(/\{\{(\w+)\}\}/g)].map((match) => match[1] ?? "");
        expect(asked.filter((name) => !known.includes(name))).toEqual([]);
      }
    }
  });
});
