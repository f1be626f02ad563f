import { QueryClientProvider } from "@tanstack/react-query";
import { Slot } from "expo-router";
import { useState } from "react";

import { createQueryClient } from "@features/api";
import { PreferencesProvider } from "@features/i18n";
import { ThemeProvider, ToastProvider, useAppFonts } from "@features/ui";

/** What every page stands in: words, theme, server answers, toasts. */
export function RootLayout() {
  const [client] = useState(createQueryClient);
  useAppFonts();
  return (
    <QueryClientProvider client={client}>
      <PreferencesProvider>
        <ThemeProvider>
          <ToastProvider>
            <Slot />
          </ToastProvider>
        </ThemeProvider>
      </PreferencesProvider>
    </QueryClientProvider>
  );
}
