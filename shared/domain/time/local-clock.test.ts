import { createLocalClock } from "./local-clock";

const minutes = (n: number) => n * 60_000;

/** Reads "HH:MM" labels of one day through a new clock and gives them back as UTC "HH:MM". */
function read(zone: string, day: readonly [number, number, number], labels: readonly string[]) {
  const clock = createLocalClock(zone);
  return labels.map((label) => {
    const [hour, minute] = label.split(":").map(Number);
    const utcMs = clock.toUtc(Date.UTC(day[0], day[1] - 1, day[2], hour, minute));
    return Number.isNaN(utcMs) ? clock.lastKind : new Date(utcMs).toISOString().slice(11, 16);
  });
}
const inParisAutumn = (...labels: string[]) => read("Europe/Paris", [2025, 10, 26], labels);

test("the first pass of a repeated hour is the earlier one and the second the later", () => {
  expect(inParisAutumn("02:00", "02:30", "02:00", "02:30")).toEqual([
    "00:00",
    "00:30",
    "01:00",
    "01:30",
  ]);
  expect(inParisAutumn("01:45", "02:00", "02:45", "02:00", "02:15", "03:00")).toEqual([
    "23:45",
    "00:00",
    "00:45",
    "01:00",
    "01:15",
    "02:00",
  ]);
});

test("an hourly file's two equal labels are two hours", () => {
  expect(inParisAutumn("00:00", "01:00", "02:00", "02:00", "03:00")).toEqual([
    "22:00",
    "23:00",
    "00:00",
    "01:00",
    "02:00",
  ]);
});

test("a repeated row inside a pass is the same instant", () => {
  expect(inParisAutumn("01:45", "02:00", "02:00", "02:15")).toEqual([
    "23:45",
    "00:00",
    "00:00",
    "00:15",
  ]);
  expect(inParisAutumn("01:00", "01:30", "02:00", "02:00", "02:30", "02:00")).toEqual([
    "23:00",
    "23:30",
    "00:00",
    "00:00",
    "00:30",
    "01:00",
  ]);
});

test("two swapped rows inside a pass do not end it", () => {
  expect(inParisAutumn("02:00", "02:05", "02:15", "02:10", "02:20")).toEqual([
    "00:00",
    "00:05",
    "00:15",
    "00:10",
    "00:20",
  ]);
});

test("a file with one pass only is read as the earlier", () => {
  expect(inParisAutumn("01:30", "01:45", "02:00", "02:15", "02:30", "02:45", "03:00")).toEqual([
    "23:30",
    "23:45",
    "00:00",
    "00:15",
    "00:30",
    "00:45",
    "02:00",
  ]);
});

test("a file written newest first meets the later pass first", () => {
  expect(inParisAutumn("03:30", "03:00", "02:30", "02:00", "02:30", "02:00", "01:30")).toEqual([
    "02:30",
    "02:00",
    "01:30",
    "01:00",
    "00:30",
    "00:00",
    "23:30",
  ]);
});

test("every minute of a clock-change day comes back in order, on Lord Howe too", () => {
  for (const [zone, dayStart, length] of [
    ["Europe/Paris", Date.UTC(2025, 9, 25, 22), 25 * 60],
    ["Australia/Lord_Howe", Date.UTC(2026, 3, 4, 13), 24.5 * 60],
    ["America/New_York", Date.UTC(2025, 10, 2, 4), 25 * 60],
  ] as const) {
    const clock = createLocalClock(zone);
    const wrong: number[] = [];
    let repeated = 0;
    const wall = new Intl.DateTimeFormat("sv-SE", {
      timeZone: zone,
      dateStyle: "short",
      timeStyle: "medium",
    });
    for (let i = 0; i < length; i++) {
      const utcMs = dayStart + minutes(i);
      const localMs = Date.parse(`${wall.format(utcMs).replace(" ", "T")}Z`);
      if (clock.toUtc(localMs) !== utcMs) wrong.push(i);
      if (clock.lastKind === "repeated") repeated++;
    }
    expect(wrong).toEqual([]);
    expect(repeated).toBe(zone === "Australia/Lord_Howe" ? 60 : 120);
  }
});

test("a time the clock jumped over is reported, and can be read as before the change", () => {
  expect(read("Europe/Paris", [2026, 3, 29], ["01:45", "02:00", "02:45", "03:00"])).toEqual([
    "00:45",
    "missing",
    "missing",
    "01:00",
  ]);
  const clock = createLocalClock("Europe/Paris");
  expect(clock.asBeforeChange(Date.UTC(2026, 2, 29, 2, 30))).toBe(Date.UTC(2026, 2, 29, 1, 30));
});

test("a row long after any other is read as the earlier pass", () => {
  const clock = createLocalClock("Europe/Paris");
  clock.toUtc(Date.UTC(2025, 11, 31, 23, 45));
  expect(clock.toUtc(Date.UTC(2025, 9, 26, 2, 30))).toBe(Date.UTC(2025, 9, 26, 0, 30));
});
