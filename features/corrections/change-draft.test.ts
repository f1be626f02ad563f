import { changeOf, draftOf, emptyDraft } from "./change-draft";
import { instantOf, minuteOf, wallTimeOf } from "@shared/domain/time/wall-time";

const asShown = (value: number) => value;

test("what the evidence page asks for fills the form in", () => {
  const draft = draftOf(
    { propose: "scaleByBore", entered: "102.26", true: "102.9651" },
    "2026-02-02T08:00:00Z",
    "Europe/Paris",
    asShown,
  );
  expect(changeOf(draft, "Europe/Paris", asShown)).toEqual({
    change: {
      kind: "scaleByBore",
      from: "2026-02-02T08:00:00.000Z",
      to: null,
      enteredBoreMm: 102.26,
      trueBoreMm: 102.9651,
    },
  });
});

test("a draft says which fields still lack something", () => {
  const from = { day: "2026-02-02", time: "8:00" };
  expect(changeOf(emptyDraft, "UTC", asShown)).toEqual({ missing: ["kind"] });
  const bore = { ...emptyDraft, kind: "scaleByBore" as const, from, trueBore: 100 };
  expect(changeOf(bore, "UTC", asShown)).toEqual({ missing: ["enteredBore"] });
  const swap = { ...emptyDraft, kind: "swapSides" as const, from, openEnd: false };
  expect(changeOf(swap, "UTC", asShown)).toEqual({ missing: ["to", "swapped"] });
});

test("a rule's bound is sent in stored units", () => {
  const draft = {
    ...emptyDraft,
    kind: "exclude" as const,
    from: { day: "2026-02-02", time: "08:00" },
    byRule: true,
    channel: "supply" as const,
    bound: 50,
  };
  const outcome = changeOf(draft, "UTC", (typed) => (typed - 32) / 1.8);
  expect(outcome).toMatchObject({
    change: { rule: { channel: "supply", is: "below", value: 10 } },
  });
});

test("wall times go to UTC and back, also round a clock change", () => {
  expect(minuteOf("7:05")).toBe(425);
  expect(minuteOf("24:00")).toBeNull();
  expect(minuteOf("soon")).toBeNull();
  const zone = "Europe/Paris";
  expect(instantOf({ day: "2026-03-29", time: "12:00" }, zone)).toBe("2026-03-29T10:00:00.000Z");
  expect(instantOf({ day: "2025-10-26", time: "02:30" }, zone)).toBe("2025-10-26T00:30:00.000Z");
  expect(instantOf({ day: "2026-03-29", time: "02:30" }, zone)).toBe("2026-03-29T01:00:00.000Z");
  expect(wallTimeOf("2026-03-29T10:00:00.000Z", zone)).toEqual({
    day: "2026-03-29",
    time: "12:00",
  });
});
