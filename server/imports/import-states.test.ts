import { importState } from "@shared/contracts/imports";
import { isCancellable, isEditable, isReopenable, nextState } from "./import-states";

test("an import goes from its files to stored readings and back", () => {
  const path = [
    ["filesWait", "reading"],
    ["questionsOpen", "asking"],
    ["checkQueued", "checking"],
    ["checkPassed", "ready"],
    ["confirmed", "importing"],
    ["stored", "imported"],
    ["undone", "undone"],
    ["checkQueued", "checking"],
  ] as const;
  let state: ReturnType<typeof nextState> = "open";
  for (const [event, expected] of path) {
    state = state && nextState(state, event);
    expect(state).toBe(expected);
  }
});

test("only a passed check can be confirmed, and only what is being stored becomes imported", () => {
  const from = (event: "confirmed" | "stored" | "undone") =>
    importState.options.filter((state) => nextState(state, event) !== null);
  expect(from("confirmed")).toEqual(["ready"]);
  expect(from("stored")).toEqual(["importing"]);
  expect(from("undone")).toEqual(["imported"]);
});

test("stored readings can be neither edited nor cancelled away, only undone", () => {
  expect(importState.options.filter(isEditable)).toEqual([
    "open",
    "reading",
    "asking",
    "checking",
    "ready",
  ]);
  expect(importState.options.filter(isReopenable)).toEqual(["undone", "failed", "cancelled"]);
  expect(isCancellable("importing")).toBe(true);
  expect(isCancellable("imported")).toBe(false);
});
