import { makeFormat } from "@features/i18n";

import { rangeWords } from "./range-bar";

const words = (from: string, to: string, today: string) =>
  rangeWords({ from, until: to, week: null }, makeFormat("en", "si", "UTC"), today);

it("names no year where all of a range lies in this one", () => {
  expect(words("2026-05-11", "2026-05-18", "2026-12-01")).toEqual({
    from: "11 May",
    to: "17 May",
    one: false,
  });
});

it("names a year once where a range lies in another", () => {
  expect(words("2026-05-11", "2026-05-18", "2027-01-05")).toMatchObject({
    from: "11 May",
    to: "17 May 2026",
  });
  expect(words("2026-05-11", "2026-05-12", "2027-01-05")).toMatchObject({
    from: "11 May 2026",
    one: true,
  });
});

it("names both years where a range crosses them", () => {
  expect(words("2025-12-29", "2026-01-05", "2026-01-05")).toMatchObject({
    from: "29 Dec 2025",
    to: "4 Jan 2026",
  });
});
