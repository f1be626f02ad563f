import i18next, { type i18n } from "i18next";
import { initReactI18next } from "react-i18next";

import type { Language } from "@shared/formats/language";

import { words, type Namespace } from "./resources";

function bundle(language: Language): Record<Namespace, object> {
  const entries = Object.entries(words).map(([name, both]) => [name, both[language]] as const);
  return Object.fromEntries(entries) as Record<Namespace, object>;
}

function start(): i18n {
  const instance = i18next.createInstance();
  // All words ship with the page, so starting is immediate and no screen ever shows a bare key.
  instance.use(initReactI18next).init({
    lng: "en",
    fallbackLng: "en",
    defaultNS: "ui",
    resources: { en: bundle("en"), de: bundle("de") },
    interpolation: { escapeValue: false },
    returnNull: false,
    initAsync: false,
  });
  return instance;
}

export const i18nInstance = start();
