import { draftOfNote, noteOf, secondOf, slowS } from "./clock-note";

const zone = "Europe/London";

it("reads the logger's time by the logger's clock and the right one by the site's", () => {
  const draft = { day: "2026-05-19", logger: "08:31:48", right: "09:32:00" };
  const note = noteOf(draft, { kind: "utc" }, zone)!;
  expect(note).toEqual({
    loggerAt: "2026-05-19T08:31:48.000Z",
    rightAt: "2026-05-19T08:32:00.000Z",
  });
  expect(slowS(note)).toBe(12);
  expect(draftOfNote(note, { kind: "utc" }, zone)).toEqual(draft);
});

it("takes the nearest day for a logger that shows another one", () => {
  const draft = { day: "2026-05-19", logger: "23:30:00", right: "00:30:10" };
  const note = noteOf(draft, { kind: "utc" }, zone)!;
  expect(note.rightAt).toBe("2026-05-18T23:30:10.000Z");
  expect(slowS(note)).toBe(10);
});

it("says that a fast logger is fast, and refuses what is no time", () => {
  const draft = { day: "2026-05-19", logger: "09:33", right: "9:32" };
  expect(slowS(noteOf(draft, { kind: "site" }, zone)!)).toBe(-60);
  expect(noteOf({ ...draft, logger: "25:00" }, { kind: "site" }, zone)).toBeNull();
  expect(noteOf({ ...draft, day: null }, { kind: "site" }, zone)).toBeNull();
  // Skipped when clocks went forward.
  expect(
    noteOf({ ...draft, day: "2026-03-29", right: "01:30" }, { kind: "site" }, zone),
  ).toBeNull();
  expect(secondOf("9:61")).toBeNull();
});
