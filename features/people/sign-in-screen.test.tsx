import {
  fill,
  ok,
  openWith,
  press,
  refusal,
  sent,
  serverAnswers,
  sessionOf,
  show,
  visited,
} from "./test-kit";
import { fireEvent, screen, waitFor } from "@testing-library/react";

import { SignInScreen } from "./sign-in-screen";

const surveyor = sessionOf("surveyor");

function typeAndPress(): void {
  fill("Email", "imogen.tarr@hcw.example");
  fill("Password", "warm return, cold supply");
  press("Sign in");
}

it("sends address and password on Enter and leads to the page that was asked for", async () => {
  openWith({ then: "/loops/3?week=2026-W20" });
  serverAnswers("POST /session", ok(surveyor));
  show(<SignInScreen />);
  fill("Email", "imogen.tarr@hcw.example");
  fill("Password", "warm return, cold supply");
  fireEvent.submit(screen.getByRole("form", { name: "Sign in" }));
  await waitFor(() => expect(visited.redirect).toHaveBeenCalledWith("/loops/3?week=2026-W20"));
  expect(sent.find(({ call }) => call === "POST /session")?.body).toEqual({
    email: "imogen.tarr@hcw.example",
    password: "warm return, cold supply",
  });
});

it("forgets what somebody before had read in this tab", async () => {
  serverAnswers("POST /session", ok(surveyor));
  const client = show(<SignInScreen />);
  client.setQueryData(["places", "sites"], ["another organisation's"]);
  typeAndPress();
  await waitFor(() => expect(visited.redirect).toHaveBeenCalled());
  expect(client.getQueryData(["places", "sites"])).toBeUndefined();
});

it("asks for what is missing and sends nothing", () => {
  show(<SignInScreen />);
  press("Sign in");
  expect(screen.getByLabelText("Email")).toHaveAccessibleDescription("Enter your email address");
  expect(screen.getByLabelText("Password")).toHaveAccessibleDescription("Enter your password");
  expect(sent.filter(({ call }) => call === "POST /session")).toEqual([]);
});

it.each([
  [
    "a wrong pair",
    refusal(401, "wrong-credentials", { detail: "They do not fit together." }),
    "They do not fit together.",
  ],
  [
    "too many attempts",
    refusal(429, "rate-limited", { remedy: "Wait 4 minutes." }),
    "Wait 4 minutes.",
  ],
  ["a silent server", "silence" as const, "The server does not answer."],
])("says what to do after %s, and keeps what was typed", async (_, answer, words) => {
  serverAnswers("POST /session", answer);
  show(<SignInScreen />);
  typeAndPress();
  expect(await screen.findByRole("alert")).toHaveTextContent(words);
  expect(screen.getByLabelText("Email")).toHaveValue("imogen.tarr@hcw.example");
  expect(visited.redirect).not.toHaveBeenCalled();
});
