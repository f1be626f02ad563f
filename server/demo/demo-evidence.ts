import type { z } from "zod";
import type {
  addCertificate,
  createInstallation,
  createInstrument,
} from "@shared/contracts/evidence";
import type { BathReading } from "@shared/domain/uncertainty/bath-check";
import { addDays } from "@shared/domain/time/local-calendar";
import { noise, seededRandom } from "./seeded-random";

/*
 * The demo's kit and how it sits on the pipes: all invented. Most of it is in order. The flow meter on
 * LTHW-4 has a lapsed certificate, the one on CHW-1B runs out soon, and the probes on CHW-1C were
 * never compared in one bath, because such things are what a record is for.
 */
type NewInstrument = z.input<typeof createInstrument.body>;
type NewCertificate = z.input<typeof addCertificate.body>;

export interface DemoInstrument {
  readonly instrument: NewInstrument;
  readonly certificate: NewCertificate | null;
}

/** Days are counted from the day the logs stop, which is about today when the demo is made. */
export function demoInstruments(endDate: string): readonly DemoInstrument[] {
  const certified = (
    instrument: NewInstrument,
    number: string,
    issuedDays: number,
    expanded: number,
  ): DemoInstrument => ({
    instrument,
    certificate: {
      number,
      laboratory: "Tideline Calibration",
      accredited: true,
      issuedOn: addDays(endDate, -issuedDays),
      dueOn: addDays(endDate, 365 - issuedDays),
      expanded,
    },
  });
  const flowMeter = (label: string, serial: string, range: string): NewInstrument => ({
    kind: "flowMeter",
    label,
    serial,
    range,
  });
  const probe = (label: string, serial: string): NewInstrument => ({
    kind: "probe",
    label,
    serial,
    range: "0 to 90 °C",
    probeClass: "A",
  });
  return [
    certified(flowMeter("FM-01", "48120", "DN 15 to 100"), "TC-2874", 402, 1.5),
    certified(flowMeter("FM-02", "50388", "DN 50 to 200"), "TC-3660", 210, 1),
    certified(flowMeter("FM-03", "50391", "DN 15 to 100"), "TC-3712", 95, 1),
    certified(flowMeter("FM-05", "50417", "DN 50 to 300"), "TC-3381", 353, 1),
    certified(probe("TP-09 red", "T0931"), "TC-3702", 160, 0.05),
    certified(probe("TP-09 blue", "T0932"), "TC-3703", 160, 0.05),
    certified(probe("TP-12 red", "T1207"), "TC-3540", 196, 0.05),
    certified(probe("TP-12 blue", "T1208"), "TC-3541", 196, 0.05),
    { instrument: probe("TP-14 red", "T1411"), certificate: null },
    { instrument: probe("TP-14 blue", "T1412"), certificate: null },
    {
      instrument: { kind: "logger", label: "TL-07", serial: "L-2207", range: "4 channels, 60 s" },
      certificate: null,
    },
    certified(
      { kind: "thicknessGauge", label: "WG-1", serial: "WG-88", range: "1 to 25 mm" },
      "TC-3399",
      353,
      0.1,
    ),
  ];
}

export interface DemoBathCheck {
  /** Serials, in the order of the difference. */
  readonly pair: readonly [first: string, second: string];
  readonly checkedOn: string;
  readonly readings: readonly BathReading[];
}

/** Two pairs, compared in ice and water and at working temperature. */
export function demoBathChecks(endDate: string): readonly DemoBathCheck[] {
  const readings = (bathC: number, differenceK: number, seed: number): BathReading[] => {
    const random = seededRandom(seed);
    const hundredths = (value: number) => Math.round(value * 100) / 100;
    return Array.from({ length: 12 }, () => {
      const waterC = bathC + 0.01 * noise(random);
      return {
        firstC: hundredths(waterC + differenceK + 0.005 * noise(random)),
        secondC: hundredths(waterC),
      };
    });
  };
  return [
    {
      pair: ["T1207", "T1208"],
      checkedOn: addDays(endDate, -30),
      readings: readings(0.2, 0.04, 21),
    },
    {
      pair: ["T0931", "T0932"],
      checkedOn: addDays(endDate, -30),
      readings: readings(55, -0.06, 22),
    },
  ];
}

type Fields = Omit<z.input<typeof createInstallation.body>, "startsAt">;

export interface DemoInstallation {
  readonly tag: string;
  /** Local day and time at which the kit was on the pipe. */
  readonly startDate: string;
  readonly startTime: string;
  readonly meter: string;
  readonly logger: string | null;
  readonly probes: readonly [supply: string, back: string] | null;
  readonly mounting: "pocket" | "surface";
  readonly fields: Fields;
}

export function demoInstallations(endDate: string): readonly DemoInstallation[] {
  const pipe = (circumferenceMm: number, wallReadingsMm: number[]) => ({
    circumferenceMm,
    outsideDiameterMm: null,
    wallReadingsMm,
    liningMm: 0,
  });
  const zeroSet = {
    flowStopped: true,
    readingMPerS: 0.006,
    remainingMPerS: 0.003,
    action: "setOnMeter",
  } as const;
  return [
    {
      tag: "CHW-1B",
      startDate: addDays(endDate, -28),
      startTime: "09:40",
      meter: "50417",
      logger: "L-2207",
      probes: ["T1207", "T1208"],
      mounting: "pocket",
      fields: {
        pipe: pipe(359.1, [4.48, 4.52, 4.51, 4.49]),
        enteredBoreMm: 105.3,
        straightRun: { upstreamM: 1.26, downstreamM: 0.64, nearestFitting: "bend" },
        shownFlowLPerS: 8.22,
        zero: zeroSet,
        soundSpeed: { displayedMPerS: 1453, fluidC: 12.1 },
        remountPercent: 0.6,
        clocks: [{ loggerSerial: "L-2207", startOffsetS: 4, endOffsetS: null }],
      },
    },
    {
      tag: "LTHW-2",
      startDate: addDays(endDate, -28),
      startTime: "11:15",
      meter: "50388",
      logger: null,
      probes: ["T0931", "T0932"],
      mounting: "surface",
      fields: {
        pipe: pipe(239.1, [3.58, 3.63, 3.61, 3.6]),
        straightRun: { upstreamM: 0.55, downstreamM: 0.4, nearestFitting: "tee" },
        shownFlowLPerS: 3.1,
        zero: { flowStopped: false, readingMPerS: null, remainingMPerS: null, action: "none" },
        soundSpeed: { displayedMPerS: 1549, fluidC: 57.8 },
        notes: "The pump serves the whole riser and could not be stopped.",
      },
    },
    {
      tag: "CHW-1C",
      startDate: addDays(endDate, -60),
      startTime: "14:20",
      meter: "50391",
      logger: null,
      probes: ["T1411", "T1412"],
      mounting: "surface",
      fields: {
        pipe: pipe(239.1, [3.6, 3.62, 3.57]),
        straightRun: { upstreamM: 0.9, downstreamM: 0.5, nearestFitting: "twoBendsInPlane" },
        shownFlowLPerS: 2.4,
        soundSpeed: { displayedMPerS: 1455, fluidC: 11.8 },
      },
    },
    {
      tag: "LTHW-4",
      startDate: addDays(endDate, -20),
      startTime: "10:05",
      meter: "48120",
      logger: null,
      probes: null,
      mounting: "pocket",
      fields: {
        pipe: pipe(189.4, [3.61, 3.59, 3.6, 3.62]),
        straightRun: { upstreamM: 0.8, downstreamM: 0.35, nearestFitting: "bend" },
        shownFlowLPerS: 1.7,
        zero: zeroSet,
        soundSpeed: { displayedMPerS: 1547, fluidC: 55.2 },
        notes: "The permanent probes of the building are used; their serials are not known.",
      },
    },
  ];
}
