import {
  fill,
  memberOf,
  ok,
  openWith,
  press,
  refusal,
  sent,
  serverAnswers,
  sessionOf,
  show,
} from "./test-kit";
import { fireEvent, screen, waitFor, within } from "@testing-library/react";

import { MembersScreen } from "./members-screen";

const imogen = memberOf("1", "Imogen Tarr", { role: "administrator", isSelf: true });
const ada = memberOf("2", "Ada Quill");
const open = memberOf("3", "", {
  name: null,
  email: "new@hcw.example",
  state: "invited",
  invitationExpiresAt: "2020-01-01T00:00:00Z",
});
const list = (...items: unknown[]) => ok({ items, nextCursor: null });
const changes = () => sent.filter(({ call }) => !call.startsWith("GET"));

it("asks the server for nothing where the role may not see members", () => {
  show(<MembersScreen />, sessionOf("surveyor"));
  expect(screen.getByText(/Only administrators see members/)).toBeVisible();
  expect(screen.queryByRole("button", { name: "Invite somebody" })).toBeNull();
  expect(sent.filter(({ call }) => call.includes("members"))).toEqual([]);
});

it("lists members page by page, with an invitation that has ended marked", async () => {
  serverAnswers("GET /members", ok({ items: [imogen, open], nextCursor: "more" }));
  serverAnswers("GET /members?cursor=more", list(ada));
  show(<MembersScreen />, sessionOf("administrator"));
  const row = (await screen.findAllByText("new@hcw.example"))[0]?.closest("tr");
  expect(row).toHaveTextContent("Invitation expired");
  press("Show more");
  expect(await screen.findByText("Ada Quill")).toBeVisible();
  expect(screen.queryByRole("button", { name: "Show more" })).toBeNull();
});

it("invites with an address and a role that must be chosen, each role explained", async () => {
  openWith({ invite: "yes" });
  serverAnswers("GET /members", list(imogen));
  serverAnswers(
    "POST /members",
    refusal(409, "already-invited", { detail: "Open invitation." }),
    ok(open),
  );
  show(<MembersScreen />, sessionOf("administrator"));
  const sheet = await screen.findByRole("dialog", { name: "Invite somebody" });
  fill("Email", "new@hcw.example");
  press("Send invitation");
  expect(within(sheet).getByText("Choose what they may do")).toBeVisible();
  fireEvent.click(within(sheet).getByRole("radio", { name: /Surveyor.*imports logs/ }));
  press("Send invitation");
  expect(await within(sheet).findByRole("alert")).toHaveTextContent("Open invitation.");
  press("Send invitation");
  await waitFor(() => expect(screen.queryByRole("dialog")).toBeNull());
  expect(screen.getByText("Invitation sent to new@hcw.example")).toBeVisible();
  expect(changes().at(-1)?.body).toEqual({ email: "new@hcw.example", role: "surveyor" });
});

it("changes a role at once and takes it back", async () => {
  serverAnswers("GET /members", list(imogen, ada));
  serverAnswers("PATCH /members/2", ok(ada));
  show(<MembersScreen />, sessionOf("administrator"));
  fireEvent.click(await screen.findByRole("button", { name: "Change Ada Quill" }));
  fireEvent.click(screen.getByRole("radio", { name: /Billing clerk/ }));
  press("Change role to Billing clerk");
  fireEvent.click(await screen.findByRole("button", { name: "Undo" }));
  await waitFor(() =>
    expect(changes().map(({ body }) => body)).toEqual([
      { role: "billingClerk" },
      { role: "surveyor" },
    ]),
  );
});

it("asks before an administrator gives up their own role, and says why the server refuses", async () => {
  openWith({ member: "1" });
  serverAnswers("GET /members", list(imogen));
  const words = { detail: "This is the organisation's only active administrator." };
  serverAnswers("PATCH /members/1", refusal(409, "last-administrator", words));
  show(<MembersScreen />, sessionOf("administrator"));
  fireEvent.click(await screen.findByRole("radio", { name: /Engineer/i }));
  press("Change role to Facilities engineer");
  const dialog = screen.getByRole("alertdialog", { name: "Give up your administrator role?" });
  expect(changes()).toEqual([]);
  press("Give up the role");
  expect(await within(dialog).findByRole("alert")).toHaveTextContent(words.detail);
});

it("names who is removed before it is done", async () => {
  openWith({ member: "2" });
  serverAnswers("GET /members", list(imogen, ada), list(imogen));
  serverAnswers("DELETE /members/2", ok({}));
  show(<MembersScreen />, sessionOf("administrator"));
  fireEvent.click(await screen.findByRole("button", { name: "Remove from organisation" }));
  expect(screen.getByRole("alertdialog", { name: "Remove Ada Quill?" })).toHaveTextContent(
    "ada.quill@hcw.example",
  );
  press("Remove");
  await waitFor(() => expect(screen.queryByText("Ada Quill")).toBeNull());
  expect(changes()).toEqual([{ call: "DELETE /members/2", body: undefined }]);
});
