import {
  fill,
  ok,
  press,
  refusal,
  sent,
  serverAnswers,
  sessionOf,
  show,
  visited,
} from "./test-kit";
import { screen, waitFor } from "@testing-library/react";

import { InvitationScreen } from "./invitation-screen";

const secret = "a-secret-of-more-than-twenty-characters";
const invited = {
  organisationName: "Harbour Court Works",
  email: "new@hcw.example",
  role: "engineer",
  hasAccount: false,
};

beforeEach(() => window.history.replaceState(null, "", `/invitation#${secret}`));

it("says what it is for, and takes the secret out of the address bar", async () => {
  serverAnswers("POST /invitations/read", ok(invited));
  show(<InvitationScreen />);
  expect(window.location.href).not.toContain(secret);
  const title = { level: 1, name: "Join Harbour Court Works" };
  expect(await screen.findByRole("heading", title)).toBeVisible();
  expect(screen.getByText("Facilities engineer")).toBeVisible();
  expect(screen.getByText("new@hcw.example")).toBeVisible();
  expect(sent.every(({ call }) => !call.includes(secret))).toBe(true);
});

it("tells the rules before, refuses a short password, and signs in with a good one", async () => {
  serverAnswers("POST /invitations/read", ok(invited));
  serverAnswers("POST /invitations/accept", ok(sessionOf("engineer")));
  show(<InvitationScreen />);
  const password = await screen.findByLabelText("Password");
  expect(password).toHaveAccessibleDescription(/At least 12 characters/);
  fill("Name", "Ada Quill");
  fill("Password", "too short");
  press("Accept and sign in");
  expect(password).toHaveAccessibleDescription("Use at least 12 characters; this has 9");
  fill("Password", "four words and a pipe");
  press("Accept and sign in");
  await waitFor(() => expect(visited.replace).toHaveBeenCalledWith("/"));
  expect(sent.filter(({ call }) => call === "POST /invitations/accept")).toEqual([
    {
      call: "POST /invitations/accept",
      body: { secret, name: "Ada Quill", password: "four words and a pipe" },
    },
  ]);
});

it("asks somebody with an account for its password only", async () => {
  serverAnswers("POST /invitations/read", ok({ ...invited, hasAccount: true }));
  serverAnswers(
    "POST /invitations/accept",
    refusal(422, "invalid", {
      errors: [{ pointer: "/body/password", code: "wrong-password", message: "Wrong." }],
    }),
  );
  show(<InvitationScreen />);
  fill("Password", await screen.findByLabelText("Password").then(() => "short"));
  expect(screen.queryByLabelText("Name")).toBeNull();
  press("Accept and sign in");
  await waitFor(() =>
    expect(screen.getByLabelText("Password")).toHaveAccessibleDescription(
      "This is not the password of your existing account",
    ),
  );
});

it("says that a spent link no longer works, and how to go on", async () => {
  serverAnswers("POST /invitations/read", refusal(410, "link-not-valid"));
  show(<InvitationScreen />);
  expect(await screen.findByRole("alert")).toHaveTextContent("This invitation no longer works");
  expect(screen.getByRole("link", { name: "Go to sign-in" })).toHaveAttribute("href", "/sign-in");
});
