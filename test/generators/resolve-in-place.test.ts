import { createLogReader } from "@shared/domain/log-files/log-reader";
import type { RawRows } from "@shared/domain/log-files/raw-rows";
import {
  DEFAULT_REPAIR_CHOICES,
  type LoggerClock,
  type RepairChoices,
} from "@shared/domain/log-files/recipe";
import { recogniseLogFile } from "@shared/domain/log-files/recognise-log-file";
import {
  NO_POINT_FACTS,
  resolveRows,
  type OriginalChannel,
} from "@shared/domain/log-files/resolve-rows";
import { writeLogFile } from "./log-file";
import { Random } from "./random";

const FILES = 120;

const clocks: readonly LoggerClock[] = [
  { kind: "site" },
  { kind: "utc" },
  { kind: "fixedOffset", offsetMinutes: 330 },
];
const choices: readonly RepairChoices[] = [
  DEFAULT_REPAIR_CHOICES,
  { ...DEFAULT_REPAIR_CHOICES, outOfOrder: "leaveOut", conflictingRepeats: "keepLast" },
  { ...DEFAULT_REPAIR_CHOICES, conflictingRepeats: "leaveOutAll", weakSignal: "exclude" },
];

/** The rows of a file with some of them moved, some twice, some twice with another reading. */
function damaged(raw: RawRows, seed: number): RawRows {
  const random = new Random(seed);
  const rows = Array.from({ length: raw.rowCount }, (_, row) => row);
  for (let defect = 0; defect < seed % 4; defect++) {
    const from = Math.floor(random.next() * rows.length);
    const moved = rows.splice(from, 1 + Math.floor(random.next() * 15));
    rows.splice(Math.floor(random.next() * rows.length), 0, ...moved, ...moved.slice(0, 2));
  }
  const take = <T extends Float64Array | Uint32Array | Uint8Array>(values: T): T =>
    values.constructor === Float64Array
      ? (Float64Array.from(rows, (row) => values[row] as number) as T)
      : values.constructor === Uint32Array
        ? (Uint32Array.from(rows, (row) => values[row] as number) as T)
        : (Uint8Array.from(rows, (row) => values[row] as number) as T);
  const channels = raw.channels.map((channel) => ({ ...channel, values: take(channel.values) }));
  const [first] = channels;
  if (first && seed % 3 === 0)
    for (let i = 7; i < rows.length; i += 40) first.values[i] = i % 80 === 7 ? -9999 : i;
  return {
    ...raw,
    rowCount: rows.length,
    line: take(raw.line),
    timeMs: take(raw.timeMs),
    isUtc: take(raw.isUtc),
    channels,
  };
}

const copyOf = (channels: readonly OriginalChannel[]) =>
  channels.map((channel) => ({ ...channel, values: channel.values.slice() }));

test(`rows resolved where they lie are those that a copy gives, in ${FILES} damaged files`, () => {
  let sorted = 0;
  let converted = 0;
  for (let seed = 1; seed <= FILES; seed++) {
    const log = writeLogFile(seed);
    const found = recogniseLogFile(log.bytes);
    if ("code" in found) throw new Error(`seed ${seed} is unreadable: ${found.code}`);
    const recipe = {
      ...found.recipe,
      time: { ...found.recipe.time, clock: clocks[seed % clocks.length] ?? null },
    };
    if (recipe.time.format.kind === "calendar" && recipe.time.format.order === null) continue;
    const read = () => {
      const reader = createLogReader(recipe);
      reader.push(log.bytes);
      return damaged(reader.end(), seed);
    };
    const chosen = choices[seed % choices.length] ?? DEFAULT_REPAIR_CHOICES;
    const { original, ...expected } = resolveRows(read(), recipe, chosen, log.siteZone);
    let steps = 0;
    let written: OriginalChannel[] = [];
    let quality: Uint8Array | undefined;
    const { original: left, ...inPlace } = resolveRows(
      read(),
      recipe,
      chosen,
      log.siteZone,
      NO_POINT_FACTS,
      {
        onStep: () => (steps += 1),
        onWritten: (rows) => {
          written = copyOf(rows.original);
          quality = rows.quality.slice();
          if (expected.shown) expect(rows.instantMs).toEqual(expected.shown.instantMs);
        },
      },
    );
    expect(inPlace).toEqual(expected);
    expect(written).toEqual(original);
    if (expected.shown) expect(quality).toEqual(expected.shown.quality);
    expect(left.every(({ meaning }) => meaning.endsWith("Counter"))).toBe(true);
    expect(steps).toBeGreaterThan(3);
    if (expected.steps.some(({ code }) => code === "outOfOrder")) sorted++;
    if (expected.steps.some(({ code }) => code === "unitConversion")) converted++;
  }
  expect(sorted).toBeGreaterThan(FILES / 4);
  expect(converted).toBeGreaterThan(FILES / 4);
});

test("work on rows where they lie stops where a step throws", () => {
  const log = writeLogFile(2);
  const found = recogniseLogFile(log.bytes);
  if ("code" in found) throw new Error(found.code);
  const reader = createLogReader(found.recipe);
  reader.push(log.bytes);
  const stop = () => {
    throw new Error("cancelled");
  };
  const recipe = {
    ...found.recipe,
    time: { ...found.recipe.time, clock: { kind: "utc" } as const },
  };
  const inPlace = { onStep: stop, onWritten: () => undefined };
  expect(() =>
    resolveRows(reader.end(), recipe, DEFAULT_REPAIR_CHOICES, "Etc/UTC", NO_POINT_FACTS, inPlace),
  ).toThrow("cancelled");
});
