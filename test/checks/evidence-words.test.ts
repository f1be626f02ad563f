import { ORIGIN_CODES, VERDICT_CODES } from "../../shared/domain/uncertainty/codes";
import german from "../../shared/words/de/evidence.json";
import english from "../../shared/words/en/evidence.json";

const holes = (text: string) => [...text.matchAll(/\{\{\s*(\w+)/g)].map(([, name]) => name);

describe.each([
  ["English", english],
  ["German", german],
])("%s words of the evidence", (_, words) => {
  it.each([
    ["verdict", VERDICT_CODES, words.verdict],
    ["origin", ORIGIN_CODES, words.origin],
  ] as const)(
    "has a sentence for every %s code, filled by values the code has",
    (_kind, codes, sentences) => {
      expect(Object.keys(sentences).sort()).toEqual(Object.keys(codes).sort());
      const foreign = Object.entries<string>(sentences).flatMap(([code, text]) => {
        const names = codes[code as keyof typeof codes] as readonly string[];
        return holes(text)
          .filter((hole) => !names.includes(hole ?? ""))
          .map((hole) => `${code}: ${hole}`);
      });
      expect(foreign).toEqual([]);
    },
  );
});
