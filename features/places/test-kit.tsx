import { QueryClientProvider } from "@tanstack/react-query";
import { configure, fireEvent, render, screen } from "@testing-library/react";
import type { ReactElement } from "react";
import type { Loop, Point, Site } from "@shared/contracts/places";
import { createQueryClient } from "@features/api";
import { PreferencesProvider } from "@features/i18n";
import { ThemeProvider, ToastProvider } from "@features/ui";
import { openWith, visited } from "./test-router";

export { openWith, visited };

/* For tests of these screens: a router that only remembers, and a server that is a list of answers. */

// jsdom has no layout and so no width: these tests stand at a desk.
Object.defineProperty(document.documentElement, "clientWidth", { value: 1440 });
Object.defineProperty(document.documentElement, "clientHeight", { value: 900 });

// Two busy cores: a second is too tight for a screen to settle.
configure({ asyncUtilTimeout: 10_000 });

jest.mock("expo-router/head", () => ({ __esModule: true, default: () => null }));
jest.mock("expo-router", () => jest.requireActual("./test-router"));

type Answer = { readonly status: number; readonly body: unknown } | "silence";

/** Every call, as `POST /sites` with its body. */
export const sent: { readonly call: string; readonly body: unknown }[] = [];
const answers = new Map<string, Answer>();

export function serverAnswers(call: string, body: unknown): void {
  answers.set(call, { status: 200, body });
}

export function serverIsSilent(call: string): void {
  answers.set(call, "silence");
}

export function serverRefuses(
  call: string,
  status: number,
  code: string,
  errors?: readonly { pointer: string; code: string; message: string }[],
): void {
  const words = { title: "Refused", detail: `Refused: ${code}.`, remedy: "Do something else." };
  answers.set(call, { status, body: { type: "about:blank", status, code, ...words, errors } });
}

beforeEach(() => {
  sent.length = 0;
  answers.clear();
  sessionStorage.clear();
  openWith({});
  visited.replace.mockClear();
  visited.push.mockClear();
  globalThis.fetch = jest.fn((url: string, init: RequestInit) => {
    const call = `${init.method} ${url.replace("/api/v1", "")}`;
    sent.push({ call, body: init.body ? JSON.parse(init.body as string) : undefined });
    const answer = answers.get(call);
    if (answer === undefined) throw new Error(`the test expects no ${call}`);
    if (answer === "silence") return Promise.reject(new TypeError("no network"));
    const text = () => Promise.resolve(JSON.stringify(answer.body));
    return Promise.resolve({ ok: answer.status < 300, status: answer.status, text });
  }) as unknown as typeof fetch;
});

export function show(page: ReactElement) {
  const client = createQueryClient();
  client.setDefaultOptions({ queries: { ...client.getDefaultOptions().queries, retry: false } });
  return render(
    <QueryClientProvider client={client}>
      <PreferencesProvider>
        <ThemeProvider>
          <ToastProvider>{page}</ToastProvider>
        </ThemeProvider>
      </PreferencesProvider>
    </QueryClientProvider>,
  );
}

export function fill(label: string, text: string): void {
  fireEvent.change(screen.getByLabelText(label), { target: { value: text } });
}

export function press(name: string | RegExp): void {
  fireEvent.click(screen.getByRole("button", { name }));
}

export function pick(name: string | RegExp): void {
  fireEvent.click(screen.getByRole("radio", { name }));
}

/** The body of the one call of this kind. */
export function bodyOf(call: string): unknown {
  const calls = sent.filter((one) => one.call === call);
  expect(calls).toHaveLength(1);
  return calls[0]?.body;
}

const ability = { edit: true, archive: true, remove: true };

export function siteOf(more: Partial<Site> = {}): Site {
  return {
    id: "1",
    name: "Harbour Court Works",
    zone: "Europe/London",
    currency: "GBP",
    unitSystem: "si",
    occupiedHours: { weekdays: [1, 2, 3, 4, 5], start: "07:00", end: "19:00", assumed: true },
    address: null,
    isDemo: false,
    archivedAt: null,
    buildingCount: 0,
    loopCount: 0,
    can: { ...ability, addLoop: true, import: true },
    ...more,
  };
}

export function loopOf(more: Partial<Loop> = {}): Loop {
  return {
    id: "7",
    siteId: "1",
    buildingId: null,
    parentLoopId: null,
    tag: "CHW-1",
    name: "Chilled mains",
    service: "chilled",
    fluid: { kind: "water" },
    gaugePressureMPa: null,
    designFlowM3PerHour: null,
    designDeltaTK: null,
    flowCutOffM3PerHour: null,
    deltaTCutOffK: null,
    notes: null,
    archivedAt: null,
    pressure: { absoluteMPa: 1.6, assumed: true },
    energyBlockedBy: null,
    hasReadings: false,
    can: { ...ability, addPoint: true },
    ...more,
  };
}

export function pointOf(more: Partial<Point> = {}): Point {
  return {
    id: "9",
    loopId: "7",
    parentPointId: null,
    code: "MP-1",
    name: "Main meter",
    role: "main",
    meterSide: "return",
    gapRule: "survey",
    pipe: null,
    bore: null,
    notes: null,
    archivedAt: null,
    hasReadings: false,
    can: { ...ability, import: true },
    ...more,
  };
}
