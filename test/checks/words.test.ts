import { readFileSync, readdirSync } from "node:fs";
import path from "node:path";
import { clientSources, usedWords } from "./used-words";

const root = path.join(__dirname, "..", "..");
/** Words of screens alone, and those that the server prints too. */
const foldersOf = (language: string) => [
  path.join(root, "features", "i18n", "locales", language),
  path.join(root, "shared", "words", language),
];

type Words = ReadonlyMap<string, string>;

function flatten(value: unknown, prefix: string, into: Map<string, string>): Map<string, string> {
  if (typeof value === "string") return into.set(prefix, value);
  if (typeof value !== "object" || value === null) throw new Error(`${prefix} is not a word.`);
  for (const [name, inner] of Object.entries(value)) {
    flatten(inner, prefix === "" ? name : `${prefix}.${name}`, into);
  }
  return into;
}

function read(language: string): ReadonlyMap<string, Words> {
  return new Map(
    foldersOf(language).flatMap((folder) =>
      readdirSync(folder).map((file): [string, Words] => {
        const content: unknown = JSON.parse(readFileSync(path.join(folder, file), "utf8"));
        return [path.basename(file, ".json"), flatten(content, "", new Map<string, string>())];
      }),
    ),
  );
}

const english = read("en");
const german = read("de");
const keysOf = (words: ReadonlyMap<string, Words>) =>
  [...words].flatMap(([namespace, entries]) =>
    [...entries.keys()].map((key) => `${namespace}:${key}`),
  );
const holes = (text: string) => [...text.matchAll(/\{\{\s*(\w+)/g)].map((match) => match[1]).sort();

describe("the words of the client", () => {
  it("have the same keys in English and German", () => {
    const [en, de] = [new Set(keysOf(english)), new Set(keysOf(german))];
    expect([...en].filter((key) => !de.has(key))).toEqual([]);
    expect([...de].filter((key) => !en.has(key))).toEqual([]);
  });

  it("are never empty and keep the same values to fill in", () => {
    const wrong: string[] = [];
    for (const [namespace, words] of english) {
      for (const [key, text] of words) {
        const other = german.get(namespace)?.get(key) ?? "";
        const same = holes(text).join() === holes(other).join();
        if (text.trim() === "" || other.trim() === "" || !same) wrong.push(`${namespace}:${key}`);
      }
    }
    expect(wrong).toEqual([]);
  });

  it("hold every key that a screen asks for", () => {
    const used = clientSources(root).flatMap((file) => usedWords(root, file));
    const missing = used
      .filter(({ namespace, key }) => {
        const places = namespace === null ? [...english.values()] : [english.get(namespace)];
        return !places.some((words) => [...(words?.keys() ?? [])].some((name) => key.test(name)));
      })
      .map(({ place, namespace, text }) => `${place} asks for ${namespace ?? "any"}:${text}`);
    expect(missing).toEqual([]);
    expect(used.length).toBeGreaterThan(0);
  });
});
