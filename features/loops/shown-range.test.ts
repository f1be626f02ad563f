import { askedRange, dayCount, defaultRange, neighbour, rangeParams } from "./shown-range";

describe("the range in the address", () => {
  it("is a whole ISO week, whichever of its days is named", () => {
    expect(askedRange({ week: "2026-05-14" })).toEqual({
      from: "2026-05-11",
      until: "2026-05-18",
      week: "2026-05-11",
    });
  });

  it("counts its last day in, and a Monday to a Sunday as a week", () => {
    expect(askedRange({ from: "2026-05-09", to: "2026-05-18" })?.until).toBe("2026-05-19");
    expect(askedRange({ from: "2026-05-11", to: "2026-05-17" })?.week).toBe("2026-05-11");
    expect(askedRange({ from: "2026-05-11", to: "2026-05-24" })?.week).toBeNull();
  });

  it.each([{ week: "20" }, { from: "2026-02-30" }, { from: "2026-05-18", to: "2026-05-09" }, {}])(
    "is not read from %j",
    (asked) => {
      expect(askedRange(asked)).toBeNull();
    },
  );

  it("comes back from what is written into the address", () => {
    for (const asked of [{ week: "2026-05-11" }, { from: "2026-01-01", to: "2026-12-31" }]) {
      const range = askedRange(asked);
      if (!range) throw new Error("a date was refused");
      expect(askedRange(rangeParams(range))).toEqual(range);
    }
  });
});

it("steps by its own length, over the turn of a year", () => {
  const range = askedRange({ from: "2025-12-22", to: "2026-01-04" });
  if (!range) throw new Error("a date was refused");
  expect(dayCount(range)).toBe(14);
  expect(neighbour(range, 1)).toMatchObject({ from: "2026-01-05", until: "2026-01-19" });
  expect(neighbour(range, -1)).toMatchObject({ from: "2025-12-08", until: "2025-12-22" });
});

it("opens on the last week with readings, on the one before while that has only begun", () => {
  const opens = (first: string | null, last: string | null) =>
    defaultRange({ first, last }, "2026-12-01").week;
  expect(opens("2026-01-01", "2026-05-17")).toBe("2026-05-11");
  expect(opens("2026-01-01", "2026-05-14")).toBe("2026-05-11");
  expect(opens("2026-01-01", "2026-05-12")).toBe("2026-05-04");
  // Nothing lies before: then the week that has only begun it is.
  expect(opens("2026-05-11", "2026-05-12")).toBe("2026-05-11");
  expect(opens(null, null)).toBe("2026-11-30");
});
