import { chromium, type Browser, type BrowserContext, type Page } from "playwright-core";

/** The two sizes every screen is looked at: a phone in the hand and a desk. */
export const viewports = {
  phone: { width: 390, height: 844 },
  wide: { width: 1440, height: 900 },
} as const;
export type Viewport = keyof typeof viewports;
export type Theme = "light" | "dark";

/** Debian's Chromium, without its own calls home. */
export function launch(): Promise<Browser> {
  return chromium.launch({
    executablePath: process.env.CHROMIUM ?? "/usr/bin/chromium",
    args: [
      "--no-sandbox",
      "--disable-gpu",
      "--disable-quic",
      "--no-first-run",
      "--no-default-browser-check",
      "--disable-background-networking",
      "--disable-component-update",
      "--disable-domain-reliability",
      "--disable-sync",
      "--disable-dev-shm-usage",
    ],
  });
}

export interface OpenOptions {
  viewport?: Viewport;
  theme?: Theme;
  language?: "en-GB" | "de-DE";
}

/** A page with cookies of its own; what goes wrong inside it is kept in `problemsOf`. */
export async function openPage(
  browser: Browser,
  { viewport = "wide", theme = "light", language = "en-GB" }: OpenOptions = {},
): Promise<Page> {
  const context: BrowserContext = await browser.newContext({
    viewport: viewports[viewport],
    colorScheme: theme,
    locale: language,
    reducedMotion: "reduce",
    hasTouch: viewport === "phone",
    acceptDownloads: true,
  });
  context.setDefaultTimeout(15_000);
  const page = await context.newPage();
  const problems: string[] = [];
  problemsByPage.set(page, problems);
  page.on("pageerror", (error) => problems.push(error.message));
  page.on("console", (message) => {
    if (message.type() === "error") problems.push(message.text());
  });
  return page;
}

const problemsByPage = new WeakMap<Page, string[]>();

/**
 * Errors the page threw or logged since it was opened. A browser logs every answer of 400 and
 * above by itself, and asking who is signed in is such an answer before sign-in: those are left out.
 */
export function problemsOf(page: Page): string[] {
  return (problemsByPage.get(page) ?? []).filter(
    (text) => !/^Failed to load resource: the server responded with a status of 4\d\d/.test(text),
  );
}
