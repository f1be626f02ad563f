import { getLocales } from "expo-localization";
import {
  createContext,
  useCallback,
  useContext,
  useEffect,
  useMemo,
  useState,
  type ReactNode,
} from "react";
import { I18nextProvider } from "react-i18next";

import type { UnitSystem } from "@shared/domain/units/display-units";
import type { Language } from "@shared/formats/language";

import { readDevice, writeDevice } from "./device-store";
import { i18nInstance } from "./i18n";

interface Preferences {
  readonly language: Language;
  /** Null follows the site being looked at. */
  readonly unitSystem: UnitSystem | null;
  /** What the account says wins over this device; called when a session arrives. */
  readonly adopt: (language: Language, unitSystem: UnitSystem | null) => void;
  readonly chooseLanguage: (language: Language) => void;
}

const PreferencesContext = createContext<Preferences>({
  language: "en",
  unitSystem: null,
  adopt: () => undefined,
  chooseLanguage: () => undefined,
});

const KEY = "loopwright.language";

function startLanguage(): Language {
  const kept = readDevice(KEY);
  if (kept === "en" || kept === "de") return kept;
  return getLocales()[0]?.languageCode === "de" ? "de" : "en";
}

/** Language and units of the person at this screen. Stored values never change with them. */
export function PreferencesProvider({ children }: { children: ReactNode }) {
  const [language, setLanguage] = useState<Language>(startLanguage);
  const [unitSystem, setUnitSystem] = useState<UnitSystem | null>(null);

  if (i18nInstance.language !== language) void i18nInstance.changeLanguage(language);
  useEffect(() => {
    if (typeof document !== "undefined") document.documentElement.lang = language;
  }, [language]);

  const chooseLanguage = useCallback((next: Language) => {
    writeDevice(KEY, next);
    setLanguage(next);
  }, []);
  const adopt = useCallback(
    (next: Language, units: UnitSystem | null) => {
      chooseLanguage(next);
      setUnitSystem(units);
    },
    [chooseLanguage],
  );
  const value = useMemo<Preferences>(
    () => ({ language, unitSystem, chooseLanguage, adopt }),
    [language, unitSystem, chooseLanguage, adopt],
  );
  return (
    <I18nextProvider i18n={i18nInstance}>
      <PreferencesContext.Provider value={value}>{children}</PreferencesContext.Provider>
    </I18nextProvider>
  );
}

export function usePreferences(): Preferences {
  return useContext(PreferencesContext);
}
