import { askedPage } from "./asked-page";

it("keeps a path of this site with its query", () => {
  expect(askedPage("/loops/3?week=2026-W20#energy")).toBe("/loops/3?week=2026-W20#energy");
});

// What browsers read as another host: URL standard, https://url.spec.whatwg.org/#url-parsing.
it.each([
  undefined,
  "",
  "loops",
  "https://elsewhere.example/",
  "//elsewhere.example",
  "/\\elsewhere.example",
  "/\t/elsewhere.example",
  "/.//elsewhere.example",
  "javascript:alert(1)",
  "/sign-in?then=/sites",
])("leads home instead of to %j", (then) => {
  expect(askedPage(then)).toBe("/");
});
