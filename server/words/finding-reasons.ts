import type { Language } from "@shared/formats/language";

/*
 * Why a correction was made that somebody chose in an import's checks. It is kept as text, in the
 * language of who confirmed the import, as a reason that was typed would be.
 */
interface Reasons {
  readonly found: Readonly<Record<string, string>>;
  readonly channel: Readonly<Record<string, string>>;
  readonly chosen: (what: string, files: string) => string;
  readonly undone: (files: string) => string;
}

const reasons: Readonly<Record<Language, Reasons>> = {
  en: {
    found: {
      farDates: "Dates far from the rest",
      spikes: "Spikes",
      clockOff: "Logger’s clock off",
      swappedSides: "Supply and return the wrong way round",
      reversedFlow: "Flow counts backwards",
      backflow: "Flow back at a start or stop",
      flowTurns: "Flow turns its direction",
      stepChange: "Step change",
      stuckChannel: "Readings stand still",
    },
    channel: { flowM3PerHour: "flow", supplyC: "supply", returnC: "return", powerKw: "power" },
    chosen: (what, files) => `${what}: found and chosen when ${files} was imported`,
    undone: (files) => `The import of ${files} was undone`,
  },
  de: {
    found: {
      farDates: "Zeiten weit weg vom Rest",
      spikes: "Ausreißer",
      clockOff: "Uhr des Loggers ging falsch",
      swappedSides: "Vorlauf und Rücklauf vertauscht",
      reversedFlow: "Durchfluss zählt rückwärts",
      backflow: "Rückfluss beim Ein- oder Ausschalten",
      flowTurns: "Durchfluss wechselt die Richtung",
      stepChange: "Sprung",
      stuckChannel: "Werte stehen still",
    },
    channel: {
      flowM3PerHour: "Durchfluss",
      supplyC: "Vorlauf",
      returnC: "Rücklauf",
      powerKw: "Leistung",
    },
    chosen: (what, files) => `${what}: beim Einlesen von ${files} gefunden und gewählt`,
    undone: (files) => `Das Einlesen von ${files} wurde rückgängig gemacht`,
  },
};

/** A reason holds 300 characters. */
const MOST_NAMES = 150;

const short = (names: readonly string[]) => {
  const all = names.join(", ");
  return all.length <= MOST_NAMES ? all : `${all.slice(0, MOST_NAMES - 1)}…`;
};

export function chosenReason(
  language: Language,
  { code, channel }: { readonly code: string; readonly channel: string | null },
  fileNames: readonly string[],
): string {
  const words = reasons[language];
  const found = words.found[code] ?? code;
  const where = channel === null ? undefined : words.channel[channel];
  return words.chosen(where === undefined ? found : `${found} (${where})`, short(fileNames));
}

export function undoneReason(language: Language, fileNames: readonly string[]): string {
  return reasons[language].undone(short(fileNames));
}
