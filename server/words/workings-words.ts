import i18next from "i18next";
import type { Language } from "@shared/formats/language";
import type { Words } from "@shared/workings/words";
import de from "@shared/words/de/workings.json";
import en from "@shared/words/en/workings.json";

const instance = i18next.createInstance();
void instance.init({
  lng: "en",
  fallbackLng: "en",
  defaultNS: "workings",
  resources: { en: { workings: en }, de: { workings: de } },
  interpolation: { escapeValue: false },
  returnNull: false,
  initAsync: false,
});

/** The words of workings in a language: the very ones the screen shows. */
export function workingsWords(language: Language): Words {
  const t = instance.getFixedT(language);
  return (key, values) => String(t(key, values ?? {}));
}
