import { QueryClientProvider } from "@tanstack/react-query";
import { configure, fireEvent, render, screen } from "@testing-library/react";
import type { ReactElement } from "react";

import type { Problem } from "@shared/contracts/contract";
import type { Member, Session } from "@shared/contracts/people";
import { createQueryClient, sessionQuery } from "@features/api";
import { PreferencesProvider } from "@features/i18n";
import { ThemeProvider, ToastProvider } from "@features/ui";

import { openWith, visited } from "./test-router";

export { openWith, visited };

/*
 * For tests of these screens: a router that only remembers, and a server that is a list of answers.
 * Import it before the screens, so that they meet this router instead of the real one.
 */

// jsdom has no layout and so no width: these tests stand at a desk.
Object.defineProperty(document.documentElement, "clientWidth", { value: 1440 });
Object.defineProperty(document.documentElement, "clientHeight", { value: 900 });

// Two busy cores: a second is too tight for a screen to settle, and working out for every element
// whether a style hides it takes most of a test's time; the screens unmount what they hide.
configure({ asyncUtilTimeout: 10_000, defaultHidden: true });

jest.mock("expo-router/head", () => ({ __esModule: true, default: () => null }));
jest.mock("expo-router", () => jest.requireActual("./test-router"));

interface Sent {
  readonly call: string;
  readonly body: unknown;
}
type Answer = { status: number; body: unknown } | "silence";

/** What the server was asked for, in order, as `POST /session` with its body. */
export const sent: Sent[] = [];
const answers = new Map<string, Answer[]>();

/** The server's next answers to a call; the last one stays. */
export function serverAnswers(call: string, ...given: Answer[]): void {
  answers.set(call, given);
}

export function ok(body: unknown): Answer {
  return { status: 200, body };
}

export function refusal(status: number, code: string, more: Partial<Problem> = {}): Answer {
  const words = { title: "Refused", detail: `Refused: ${code}.`, remedy: "Do something else." };
  return { status, body: { type: "about:blank", status, code, ...words, ...more } };
}

beforeEach(() => {
  sent.length = 0;
  answers.clear();
  openWith({});
  visited.replace.mockClear();
  visited.redirect.mockClear();
  serverAnswers("GET /session", refusal(401, "not-signed-in"));
  globalThis.fetch = jest.fn((url: string, init: RequestInit) => {
    const call = `${init.method} ${url.replace("/api/v1", "")}`;
    sent.push({ call, body: init.body ? JSON.parse(init.body as string) : undefined });
    const queue = answers.get(call);
    if (!queue) throw new Error(`the test expects no ${call}`);
    const next = queue.length > 1 ? queue.shift() : queue[0];
    if (next === undefined || next === "silence")
      return Promise.reject(new TypeError("no network"));
    const text = () => Promise.resolve(JSON.stringify(next.body));
    return Promise.resolve({ ok: next.status < 300, status: next.status, text });
  }) as unknown as typeof fetch;
});

/** Shows a screen, with somebody signed in where a session is given. */
export function show(page: ReactElement, session?: Session) {
  const client = createQueryClient();
  client.setDefaultOptions({ queries: { ...client.getDefaultOptions().queries, retry: false } });
  if (session) {
    client.setQueryData(sessionQuery.queryKey, session);
    serverAnswers("GET /session", ok(session));
  }
  render(
    <QueryClientProvider client={client}>
      <PreferencesProvider>
        <ThemeProvider>
          <ToastProvider>{page}</ToastProvider>
        </ThemeProvider>
      </PreferencesProvider>
    </QueryClientProvider>,
  );
  return client;
}

export function fill(label: string, text: string): void {
  fireEvent.change(screen.getByLabelText(label), { target: { value: text } });
}

export function press(name: string | RegExp): void {
  fireEvent.click(screen.getByRole("button", { name }));
}

export function sessionOf(role: Session["role"]): Session {
  const administers = role === "administrator";
  return {
    account: {
      id: "1",
      name: "Imogen Tarr",
      email: "imogen.tarr@hcw.example",
      language: "en",
      unitSystem: null,
    },
    organisation: { id: "1", name: "Harbour Court Works" },
    role,
    can: {
      seeSites: role !== "tenantContact",
      editSites: administers,
      editPoints: administers,
      importLogs: administers,
      manageMembers: administers,
      manageTokens: administers,
      seeMail: false,
    },
  };
}

export function memberOf(id: string, name: string, more: Partial<Member> = {}): Member {
  return {
    id,
    name,
    email: `${name.toLowerCase().replace(" ", ".")}@hcw.example`,
    role: "surveyor",
    state: "active",
    invitedAt: null,
    invitationExpiresAt: null,
    lastSeenAt: null,
    isSelf: false,
    can: { edit: true, remove: true },
    ...more,
  };
}
