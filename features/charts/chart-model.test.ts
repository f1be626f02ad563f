import { makeFormat } from "@features/i18n";
import type { SeriesAnswer } from "@shared/contracts/energy";
import { packNumbers } from "@shared/domain/readings/packed-numbers";
import { DAY_MS, HOUR_MS } from "@shared/domain/time/interval";
import { rangeOfDates } from "@shared/domain/time/local-calendar";

import { chartLayout, plotWidth, powerLayout } from "./chart-layout";
import { chartSeries, nearestColumn, stepColumn } from "./chart-series";
import { columnLabels } from "./column-labels";
import { chartUnits } from "./chart-units";
import { cursorReading } from "./cursor-reading";
import { plotPicture } from "./plot-picture";
import { powerPicture, shownPower } from "./power-picture";
import { timeAxis } from "./time-columns";
import { lacks } from "./use-chart-series";
import { flowAxis, temperatureAxis } from "./value-axis";
import { clampView, panView, pinchView, zoomView } from "./view-window";

const zone = "Europe/London";
const week = rangeOfDates("2026-05-11", "2026-05-18", zone);
const format = makeFormat("en", "si", zone);
const units = chartUnits(format);

const columnOf = (value: (column: number) => number | null) =>
  packNumbers(
    Array.from({ length: 336 }, (_, i) => value(i)),
    2,
  );

function answer(change: Partial<SeriesAnswer> = {}): SeriesAnswer {
  return {
    zone,
    fromMs: week.startMs,
    toMs: week.endMs,
    nominalStepS: 60,
    rows: 10_080,
    averagedOverS: 1800,
    t0Ms: week.startMs,
    tMs: null,
    supplyC: columnOf(() => 6),
    returnC: columnOf((i) => (i === 100 ? null : 12)),
    flowM3PerHour: columnOf(() => 20),
    powerKw: columnOf(() => -140),
    envelope: null,
    quality: [],
    yExtent: { temperatureC: [6, 12], flowM3PerHour: [20, 20] },
    ...change,
  };
}

describe("the view", () => {
  const bounds = { range: { startMs: 0, endMs: 1000 }, leastMs: 10 };

  it("zooms round the place under the pointer and never out of its range", () => {
    expect(zoomView({ startMs: 0, endMs: 1000 }, 0.5, 250, bounds)).toEqual({
      startMs: 125,
      endMs: 625,
    });
    expect(zoomView({ startMs: 900, endMs: 1000 }, 50, 950, bounds)).toEqual(bounds.range);
    expect(zoomView({ startMs: 0, endMs: 20 }, 0.01, 5, bounds).endMs).toBeCloseTo(10 + 2.5, 0);
  });

  it("stops at the edge when it is dragged beyond", () => {
    expect(panView({ startMs: 800, endMs: 900 }, 400, bounds)).toEqual({
      startMs: 900,
      endMs: 1000,
    });
    expect(clampView({ startMs: -50, endMs: 50 }, bounds)).toEqual({ startMs: 0, endMs: 100 });
  });

  it("keeps both instants under the fingers of a pinch", () => {
    expect(pinchView({ aMs: 400, bMs: 600 }, 0.25, 0.75, bounds)).toEqual({
      startMs: 300,
      endMs: 700,
    });
  });
});

describe("the axes", () => {
  it("are round, hold every value and leave a step of air below the curves", () => {
    const axis = temperatureAxis([6.2, 12.7]);
    expect(axis.ticks).toEqual([4, 6, 8, 10, 12, 14]);
    expect(flowAxis([0, 35.1]).ticks).toEqual([0, 20, 40]);
    expect(flowAxis(null).ticks.length).toBeGreaterThan(1);
    expect(temperatureAxis(null).high).toBeGreaterThan(temperatureAxis(null).low);
  });

  it("name days, then weeks, months and years as room gets short", () => {
    const unit = (days: number) =>
      timeAxis({ startMs: week.startMs, endMs: week.startMs + days * DAY_MS }, zone, 700).columns[0]
        ?.unit;
    expect([7, 60, 400, 9000].map(unit)).toEqual(["day", "week", "month", "year"]);
  });

  it("give the day that clocks change its own length", () => {
    const { columns } = timeAxis(rangeOfDates("2026-10-24", "2026-10-27", zone), zone, 700);
    expect(columns.map((column) => (column.endMs - column.startMs) / HOUR_MS)).toEqual([
      24, 25, 24,
    ]);
  });
});

describe("the labels under the plot", () => {
  const days = Array.from({ length: 7 }, (_, i) => ({
    date: `2026-05-${11 + i}`,
    heatingKwh: 0,
    coolingKwh: i === 6 ? null : 2000 + i,
  }));
  const options = { zone, days, registers: ["cooling"] as const, format, weekName: String };

  it("carry each day's energy on a wide screen, a dash where nothing is covered", () => {
    const labels = columnLabels({ ...options, view: week, layout: chartLayout(806, 1) });
    expect(labels.map((label) => `${label.name} ${label.faint}`)[0]).toBe("Mon 11");
    expect(labels.map((label) => label.energies[0])).toEqual([
      2000,
      2001,
      2002,
      2003,
      2004,
      2005,
      null,
    ]);
  });

  it("carry each day's ± where there is room for it, and only of single days", () => {
    const known = {
      heating: null,
      cooling: { expanded: 75, percent: 3, basis: "evidence" },
    } as const;
    const withPlusMinus = days.map((day) => ({ ...day, plusMinus: known }));
    const of = (width: number, view = week) =>
      columnLabels({ ...options, days: withPlusMinus, view, layout: chartLayout(width, 1) });
    expect(of(806).map((label) => label.uncertainties[0])).toEqual(Array(7).fill(75));
    // 60 px a day hold 2,000 but not 2,000 ±75.
    expect(of(530 + 38).every((label) => label.uncertainties.length === 0)).toBe(true);
    expect(of(568)[0]?.energies).toEqual([2000]);
    const weeks = { startMs: week.startMs, endMs: week.startMs + 60 * DAY_MS };
    expect(of(806, weeks)[0]).toMatchObject({ uncertainties: [null] });
  });

  it("keep to the weekdays' names on a phone", () => {
    const labels = columnLabels({ ...options, view: week, layout: chartLayout(334, 1) });
    expect(labels.map((label) => label.name)).toContain("Wed");
    expect(labels.every((label) => label.energies.length === 0)).toBe(true);
  });
});

describe("the picture", () => {
  const layout = chartLayout(806, 1);
  const picture = (service: "chilled" | "changeover", change: Partial<SeriesAnswer> = {}) =>
    plotPicture({
      series: chartSeries(answer(change), units),
      view: week,
      layout,
      temperature: temperatureAxis([6, 12]),
      flow: flowAxis([0, 20]),
      service,
    });

  it("lifts the pen where a column holds nothing, in the line and in the band", () => {
    const { band, return: back, supply, bars } = picture("chilled");
    expect(back.cooling[100]?.y).toBeNull();
    expect(band.cooling[100]?.y).toBeNull();
    expect(supply.cooling[100]?.y).not.toBeNull();
    expect(band.heating).toEqual([]);
    expect(bars).toHaveLength(336);
    expect(Math.max(...bars.map((bar) => bar.x + bar.width))).toBeLessThanOrEqual(
      plotWidth(layout),
    );
  });

  it("splits a changeover loop's band by what each column did", () => {
    const { band } = picture("changeover", {
      supplyC: columnOf((i) => (i < 168 ? 40 : 6)),
    });
    expect(band.heating[10]?.y).not.toBeNull();
    expect(band.cooling[10]?.y).toBeNull();
    expect(band.cooling[300]?.y).not.toBeNull();
    expect(band.heating[300]?.y).toBeNull();
  });
});

describe("the picture of power alone", () => {
  const layout = powerLayout(chartLayout(806, 1));
  const nothing = columnOf(() => null);
  const of = (service: "chilled" | "hot" | "changeover", kw: (column: number) => number | null) => {
    const series = chartSeries(
      answer({
        supplyC: nothing,
        returnC: nothing,
        flowM3PerHour: nothing,
        powerKw: columnOf(kw),
        yExtent: { temperatureC: null, flowM3PerHour: null },
      }),
      units,
    );
    const power = shownPower(series, service, units);
    const axis = flowAxis([0, 200]);
    const picture = powerPicture({ series, power, view: week, layout, axis, service });
    return { series, power, picture };
  };

  it("fills from zero up to the loop's own register and lifts the pen over a hole", () => {
    const { power, picture } = of("chilled", (i) => (i === 100 ? null : -150));
    expect(power[0]).toBe(150);
    const { top, bottom } = layout.temperature;
    expect(picture.supply.cooling[0]?.y).toBeCloseTo((bottom - top) / 4, 6);
    expect(picture.band.cooling[0]?.y0).toBeCloseTo(bottom - top, 6);
    expect(picture.supply.cooling[100]?.y).toBeNull();
    expect(picture.band.cooling[100]?.y).toBeNull();
    expect([picture.supply.heating, picture.return.cooling, picture.bars]).toEqual([[], [], []]);
  });

  it("has power of the other register under zero, and none on a changeover loop", () => {
    expect(of("hot", () => -20).power[0]).toBe(-20);
    const { power, picture } = of("changeover", (i) => (i < 168 ? 90 : -60));
    expect([power[0], power[300]]).toEqual([90, 60]);
    expect(picture.supply.heating[0]?.y).not.toBeNull();
    expect(picture.supply.cooling[0]?.y).toBeNull();
    expect(picture.supply.cooling[300]?.y).not.toBeNull();
  });

  it("is stepped through by its power and says it", () => {
    const { series } = of("hot", (i) => (i === 1 ? null : 90));
    expect(stepColumn(series, 0, 1)).toBe(2);
    expect(cursorReading(series, 2)).toMatchObject({ supply: null, flow: null, powerKw: 90 });
  });
});

describe("the columns", () => {
  const series = chartSeries(
    answer({
      supplyC: packNumbers([6, null, 6], 2),
      flowM3PerHour: packNumbers([1, null, 1], 2),
      powerKw: packNumbers([-7, null, -7], 2),
    }),
    units,
  );

  it("are found by time and stepped through over holes", () => {
    expect(nearestColumn(series, week.startMs + 1900 * 1000)).toBe(1);
    expect(stepColumn(series, 0, 1)).toBe(2);
    expect(stepColumn(series, 2, 1)).toBe(2);
  });

  it("are fetched anew only where a finer picture could be had", () => {
    const whole = chartSeries(answer(), units);
    expect(lacks(whole, week, 704)).toBe(false);
    const day = { startMs: week.startMs, endMs: week.startMs + DAY_MS };
    expect(lacks(whole, day, 704)).toBe(true);
    const rows = chartSeries(
      answer({ averagedOverS: null, tMs: packNumbers([0, 1, 2], 0) }),
      units,
    );
    expect(lacks(rows, day, 704)).toBe(false);
    // Fifteen-minute rows have nothing finer to give.
    const quarter = chartSeries(answer({ averagedOverS: 900, nominalStepS: 900 }), units);
    expect(lacks(quarter, day, 704)).toBe(false);
  });
});
