import * as fc from "fast-check";
import { KEEP, type Finding, type FindingWeight } from "./finding";
import { rankFindings } from "./rank-findings";

const finding = (code: string, weight: FindingWeight, startMs = 0): Finding => ({
  code,
  weight,
  channel: null,
  rows: [],
  rowCount: 0,
  spans: [{ startMs, endMs: startMs + 1 }],
  figures: {},
  choices: [KEEP],
});

it("orders by weight, then by energy at stake whichever its sign, unknown last, then by time", () => {
  const kwh: Readonly<Record<string, number | null>> = {
    a: 5,
    b: 900,
    c: -70,
    d: 20,
    e: null,
    f: 0,
    g: 20,
  };
  const ranked = rankFindings(
    [
      finding("b", "note"),
      finding("e", "look"),
      finding("d", "look", 9),
      finding("f", "look"),
      finding("c", "look"),
      finding("g", "look", 3),
      finding("a", "stop"),
    ],
    ({ code }) => kwh[code]!,
  );
  expect(ranked.map(({ code }) => code).join("")).toBe("acgdfeb");
});

it("loses and changes nothing, and does not mind the order it is given", () => {
  const some = fc.array(
    fc.tuple(
      fc.constantFrom("stop" as const, "look" as const, "note" as const),
      fc.option(fc.double({ noNaN: true })),
    ),
  );
  fc.assert(
    fc.property(some, (list) => {
      const kwh = new Map(
        list.map(([weight, stake], i) => [finding(String(i), weight, i), stake] as const),
      );
      const given = [...kwh.keys()];
      const ranked = rankFindings(given, (found) => kwh.get(found)!);
      expect(new Set(ranked)).toEqual(new Set(given));
      expect(rankFindings([...given].reverse(), (found) => kwh.get(found)!)).toEqual(ranked);
    }),
  );
});
