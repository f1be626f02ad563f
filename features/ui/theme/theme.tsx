import { createContext, useContext, useMemo, useState, type ReactNode } from "react";
import { useColorScheme } from "react-native";

import {
  lightColours,
  lightRamp,
  plantRoomColours,
  plantRoomRamp,
  type Colours,
  type Ramp,
} from "./colours";
import { readDevice, writeDevice } from "@features/i18n/device-store";
import { GlobalStyle } from "./global-style";

export type ThemeName = "light" | "plantRoom";
export type ThemeChoice = ThemeName | "system";

export interface Theme {
  readonly name: ThemeName;
  readonly colour: Colours;
  readonly ramp: Ramp;
  /** Shadow of the few things that float: sheets, dialogs, pickers, toasts. */
  readonly float: string;
}

const light: Theme = {
  name: "light",
  colour: lightColours,
  ramp: lightRamp,
  float: "0 10px 30px rgba(15,31,46,.18), 0 2px 6px rgba(15,31,46,.10)",
};

const plantRoom: Theme = {
  name: "plantRoom",
  colour: plantRoomColours,
  ramp: plantRoomRamp,
  float: "0 14px 36px rgba(0,0,0,.55), 0 2px 6px rgba(0,0,0,.4)",
};

interface ThemeState {
  readonly theme: Theme;
  readonly choice: ThemeChoice;
  readonly choose: (choice: ThemeChoice) => void;
}

const ThemeContext = createContext<ThemeState>({
  theme: light,
  choice: "light",
  choose: () => undefined,
});

const KEY = "loopwright.theme";

function storedChoice(): ThemeChoice {
  const kept = readDevice(KEY);
  return kept === "light" || kept === "plantRoom" ? kept : "system";
}

/** Holds the theme of this device; it follows the system until somebody chooses. */
export function ThemeProvider({ children }: { children: ReactNode }) {
  const system = useColorScheme();
  const [choice, setChoice] = useState<ThemeChoice>(storedChoice);
  const dark = choice === "plantRoom" || (choice === "system" && system === "dark");
  const theme = dark ? plantRoom : light;
  const state = useMemo<ThemeState>(
    () => ({
      theme,
      choice,
      choose: (next) => {
        writeDevice(KEY, next);
        setChoice(next);
      },
    }),
    [theme, choice],
  );
  return (
    <ThemeContext.Provider value={state}>
      <GlobalStyle theme={theme} />
      {children}
    </ThemeContext.Provider>
  );
}

export function useTheme(): Theme {
  return useContext(ThemeContext).theme;
}

export function useThemeChoice(): Omit<ThemeState, "theme"> {
  return useContext(ThemeContext);
}
