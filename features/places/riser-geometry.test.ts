import { phoneSizes, riserPipes, risersOf, riserWidth, wideSizes } from "./riser-geometry";

const chilled = (id: string, parentLoopId: string | null) => ({ id, parentLoopId, heating: false });

test("each loop that feeds others is a riser with all that hangs on it, cooling first", () => {
  const risers = risersOf([
    { id: "h", parentLoopId: null, heating: true },
    { id: "h1", parentLoopId: "h", heating: true },
    chilled("c", null),
    chilled("c1", "c"),
    chilled("c1a", "c1"),
    chilled("alone", null),
    chilled("orphan", "archived"),
  ]);
  expect(risers.map(({ root, members }) => [root.id, members.map(({ id }) => id)])).toEqual([
    ["c", ["c", "c1", "c1a"]],
    ["h", ["h", "h1"]],
  ]);
});

test("a riser turns into its topmost and lowest rows and branches to those between", () => {
  const rows = [47, 211, 375, 540].map((y, index) => ({ loopId: String(index), y }));
  const pipes = riserPipes([{ rootId: "3", heating: false, rows }], 216, wideSizes);
  expect(pipes.map(({ leg, width }) => [leg, width])).toEqual([
    ["return", 11],
    ["supply", 11],
    ["supply", 7],
    ["supply", 7],
    ["return", 7],
    ["return", 7],
  ]);
  expect(pipes[1]?.d).toBe("M216 540H26a14 14 0 0 1 -14 -14V61a14 14 0 0 1 14 -14H216");
  expect(pipes[4]?.d).toBe("M34 227H216");
});

test("room is left for every riser", () => {
  expect(riserWidth(0, phoneSizes)).toBe(0);
  expect(riserWidth(2, wideSizes)).toBe(198);
  expect(riserWidth(2, phoneSizes)).toBe(52);
});
