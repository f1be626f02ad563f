import { TimeLeft } from "./time-left";

test("time left follows the pace of the stage under way", () => {
  const left = new TimeLeft();
  const reading = (rowsRead: number) => ({ stage: "reading" as const, rowsRead, rowsTotal: 1000 });
  expect(left.after(reading(0), 0)).toBeNull();
  expect(left.after(reading(250), 1000)).toBe(3);
  // Storing starts its own clock: what reading took says nothing about it.
  const storing = { stage: "storing" as const, rowsRead: 0, rowsTotal: 1000 };
  expect(left.after(storing, 4000)).toBeNull();
  expect(left.after({ ...storing, rowsRead: 500 }, 4500)).toBe(1);
});
