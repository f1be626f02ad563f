import type { z } from "zod";
import type {
  createInstallation,
  fitting,
  Installation,
  InstallationFields,
} from "@shared/contracts/evidence";
import { localDateOf } from "@shared/domain/time/local-calendar";
import { createLocalClock } from "@shared/domain/time/local-clock";
import type { BudgetTermKind } from "@shared/domain/uncertainty/point-evidence";

export type InstallationBody = Omit<
  z.input<(typeof createInstallation)["body"]>,
  "supersedes" | "reason"
>;
export type Fitting = z.infer<typeof fitting>;
type ZeroAction = NonNullable<InstallationFields["zero"]>["action"];
export type Mounting = NonNullable<InstallationFields["probes"]>["supply"]["mounting"];

export const NONE = "none";
export type MeterClassChoice = typeof NONE | "1" | "2" | "3";
/** No check chosen: the newest of the pair by the start speaks. */
export const NEWEST = "newest";

export interface ClockValues {
  readonly serial: string;
  readonly startS: number | null;
  readonly endS: number | null;
}
export interface EditValues {
  readonly kind: BudgetTermKind;
  readonly value: number | null;
  readonly reason: string;
}
export interface ProbeValues {
  readonly probeId: string;
  readonly mounting: Mounting | null;
  readonly depthMm: number | null;
  readonly insulated: boolean;
}

/** The form as typed, in stored units; null or an empty text while nobody has said. */
export interface InstallationValues {
  readonly startDate: string | null;
  readonly startTime: string;
  readonly endDate: string | null;
  readonly endTime: string;
  readonly circumferenceMm: number | null;
  readonly outsideDiameterMm: number | null;
  readonly walls: string;
  readonly liningMm: number | null;
  readonly outsideUncertaintyMm: number | null;
  readonly gaugeUncertaintyMm: number | null;
  readonly enteredBoreMm: number | null;
  readonly upstreamM: number | null;
  readonly downstreamM: number | null;
  readonly nearestFitting: Fitting | null;
  readonly flowMeterId: string;
  readonly flowDriftPercent: number | null;
  readonly flowStepLPerS: number | null;
  readonly shownFlowLPerS: number | null;
  readonly remountPercent: number | null;
  readonly meterClass: MeterClassChoice;
  readonly permanentFlowM3PerHour: number | null;
  readonly minimumDeltaTK: number | null;
  readonly meterCertificate: string;
  readonly meterCertificatePercent: number | null;
  readonly meterCertificateK: number | null;
  readonly flowStopped: "yes" | "no" | null;
  readonly zeroReadingMPerS: number | null;
  readonly zeroRemainingMPerS: number | null;
  readonly zeroAction: ZeroAction;
  readonly soundSpeedMPerS: number | null;
  readonly fluidC: number | null;
  readonly supply: ProbeValues;
  readonly return: ProbeValues;
  readonly bathCheckId: string;
  readonly mountingK: number | null;
  readonly temperatureStepK: number | null;
  readonly loggerId: string;
  readonly clocks: readonly ClockValues[];
  readonly flowNoisePercent: number | null;
  readonly deltaTNoiseK: number | null;
  readonly autocorrelation: number | null;
  readonly fluidTestedOn: string | null;
  readonly edits: readonly EditValues[];
  readonly notes: string;
  readonly reason: string;
}

const noProbe: ProbeValues = { probeId: NONE, mounting: null, depthMm: null, insulated: false };
type Probe = NonNullable<InstallationFields["probes"]>["supply"];
const probeValues = (probe: Probe | undefined): ProbeValues => probe ?? noProbe;

function localTime(instant: string, zone: string): string {
  const time = new Intl.DateTimeFormat("en-GB", {
    timeZone: zone,
    hour: "2-digit",
    minute: "2-digit",
  });
  return time.format(Date.parse(instant));
}

/** The form of a stored installation, or an empty one. */
export function installationValues(from: Installation | null, zone: string): InstallationValues {
  const day = (instant: string | null | undefined) =>
    instant ? localDateOf(Date.parse(instant), zone) : null;
  const { pipe, straightRun, zero, noise, meterPlate } = from ?? {};
  return {
    startDate: day(from?.startsAt),
    startTime: from ? localTime(from.startsAt, zone) : "",
    endDate: day(from?.endsAt),
    endTime: from?.endsAt ? localTime(from.endsAt, zone) : "",
    circumferenceMm: pipe?.circumferenceMm ?? null,
    outsideDiameterMm: pipe?.outsideDiameterMm ?? null,
    walls: pipe?.wallReadingsMm.join("  ") ?? "",
    liningMm: pipe?.liningMm ?? null,
    outsideUncertaintyMm: pipe?.outsideDiameterUncertaintyMm ?? 0.2,
    gaugeUncertaintyMm: pipe?.gaugeUncertaintyMm ?? 0.05,
    enteredBoreMm: from?.enteredBoreMm ?? null,
    upstreamM: straightRun?.upstreamM ?? null,
    downstreamM: straightRun?.downstreamM ?? null,
    nearestFitting: straightRun?.nearestFitting ?? null,
    flowMeterId: from?.flowMeterId ?? NONE,
    flowDriftPercent: from?.flowDriftPercent ?? null,
    flowStepLPerS: from?.flowStepLPerS ?? null,
    shownFlowLPerS: from?.shownFlowLPerS ?? null,
    remountPercent: from?.remountPercent ?? null,
    meterClass: meterPlate ? `${meterPlate.accuracyClass}` : NONE,
    permanentFlowM3PerHour: meterPlate?.permanentFlowM3PerHour ?? null,
    minimumDeltaTK: meterPlate?.minimumDeltaTK ?? null,
    meterCertificate: meterPlate?.certificate?.number ?? "",
    meterCertificatePercent: meterPlate?.certificate?.expandedPercent ?? null,
    meterCertificateK: meterPlate?.certificate?.k ?? null,
    flowStopped: zero ? (zero.flowStopped ? "yes" : "no") : null,
    zeroReadingMPerS: zero?.readingMPerS ?? null,
    zeroRemainingMPerS: zero?.remainingMPerS ?? null,
    zeroAction: zero?.action ?? "none",
    soundSpeedMPerS: from?.soundSpeed?.displayedMPerS ?? null,
    fluidC: from?.soundSpeed?.fluidC ?? null,
    supply: probeValues(from?.probes?.supply),
    return: probeValues(from?.probes?.return),
    bathCheckId: from?.bathCheckId ?? NEWEST,
    mountingK: from?.mountingK ?? null,
    temperatureStepK: from?.temperatureStepK ?? null,
    loggerId: from?.loggerId ?? NONE,
    clocks:
      from?.clocks.map(({ loggerSerial, startOffsetS, endOffsetS }) => ({
        serial: loggerSerial,
        startS: startOffsetS,
        endS: endOffsetS,
      })) ?? [],
    flowNoisePercent: noise?.flowPercent ?? null,
    deltaTNoiseK: noise?.deltaTK ?? null,
    autocorrelation: noise?.autocorrelation ?? null,
    fluidTestedOn: from?.fluidTestedOn ?? null,
    edits: from?.edits ?? [],
    notes: from?.notes ?? "",
    reason: "",
  };
}

/** Wall readings as typed, apart by blanks or semicolons; null where one is no thickness. */
export function readWalls(text: string): readonly number[] | null {
  const parts = text.split(/[\s;]+/).filter((part) => part !== "");
  const walls = parts.map((part) =>
    /^\d{1,2}([.,]\d{1,4})?$/.test(part) ? Number(part.replace(",", ".")) : NaN,
  );
  return walls.every((wall) => wall >= 0.5 && wall <= 40) ? walls : null;
}

/** The instant of a local day and time; an empty time is midnight. Null where there is none. */
export function instantOf(day: string | null, time: string, zone: string): string | null {
  const match = /^(\d{1,2}):(\d{2})$/.exec(time.trim() === "" ? "00:00" : time.trim());
  if (day === null || match === null) return null;
  const [hours, minutes] = [Number(match[1]), Number(match[2])];
  if (hours > 23 || minutes > 59) return null;
  const utc = createLocalClock(zone).toUtc(
    Date.parse(`${day}T00:00:00Z`) + (hours * 60 + minutes) * 60_000,
  );
  return Number.isNaN(utc) ? null : new Date(utc).toISOString();
}

/**
 * What is sent: sections that are not complete yet are left unknown. Null without a start.
 * @param before the version being corrected: a time nobody touched goes back to the millisecond.
 */
export function bodyOf(
  values: InstallationValues,
  zone: string,
  before: Installation | null = null,
): InstallationBody | null {
  const was = before && installationValues(before, zone);
  const untouched = (date: "startDate" | "endDate", time: "startTime" | "endTime") =>
    was !== null && was[date] === values[date] && was[time] === values[time];
  const startsAt = untouched("startDate", "startTime")
    ? (before?.startsAt ?? null)
    : instantOf(values.startDate, values.startTime, zone);
  const endsAt = untouched("endDate", "endTime")
    ? (before?.endsAt ?? null)
    : instantOf(values.endDate, values.endTime, zone);
  if (startsAt === null) return null;
  const idOf = (id: string) => (id === NONE || id === NEWEST ? null : id);
  const { flowNoisePercent, deltaTNoiseK, autocorrelation, clocks, edits } = values;
  const noisy = flowNoisePercent !== null || deltaTNoiseK !== null || autocorrelation !== null;
  const probes = probesOf(values);
  return {
    startsAt,
    endsAt,
    flowMeterId: idOf(values.flowMeterId),
    loggerId: idOf(values.loggerId),
    flowDriftPercent: values.flowDriftPercent,
    flowStepLPerS: values.flowStepLPerS,
    meterPlate: plateOf(values),
    pipe: pipeOf(values),
    enteredBoreMm: values.enteredBoreMm,
    straightRun:
      values.upstreamM === null || values.downstreamM === null || values.nearestFitting === null
        ? null
        : {
            upstreamM: values.upstreamM,
            downstreamM: values.downstreamM,
            nearestFitting: values.nearestFitting,
          },
    zero:
      values.flowStopped === null
        ? null
        : {
            flowStopped: values.flowStopped === "yes",
            readingMPerS: values.zeroReadingMPerS,
            remainingMPerS: values.zeroRemainingMPerS,
            action: values.zeroAction,
          },
    shownFlowLPerS: values.shownFlowLPerS,
    soundSpeed:
      values.soundSpeedMPerS === null || values.fluidC === null
        ? null
        : { displayedMPerS: values.soundSpeedMPerS, fluidC: values.fluidC },
    remountPercent: values.remountPercent,
    probes,
    mountingK: values.mountingK,
    temperatureStepK: values.temperatureStepK,
    bathCheckId: probes === null ? null : idOf(values.bathCheckId),
    clocks: clocks.flatMap(({ serial, startS, endS }) =>
      serial.trim() === "" || (startS === null && endS === null)
        ? []
        : [{ loggerSerial: serial.trim(), startOffsetS: startS, endOffsetS: endS }],
    ),
    noise: noisy ? { flowPercent: flowNoisePercent, deltaTK: deltaTNoiseK, autocorrelation } : null,
    fluidTestedOn: values.fluidTestedOn,
    edits: edits.flatMap(({ kind, value, reason }) =>
      value === null || reason.trim() === "" ? [] : [{ kind, value, reason: reason.trim() }],
    ),
    notes: values.notes.trim() || null,
  };
}

const CLASSES = { "1": 1, "2": 2, "3": 3 } as const;

function plateOf(values: InstallationValues): InstallationBody["meterPlate"] {
  if (values.meterClass === NONE) return null;
  const number = values.meterCertificate.trim();
  const { meterCertificatePercent: expandedPercent, meterCertificateK: k } = values;
  return {
    accuracyClass: CLASSES[values.meterClass],
    permanentFlowM3PerHour: values.permanentFlowM3PerHour,
    minimumDeltaTK: values.minimumDeltaTK,
    certificate:
      number === "" || expandedPercent === null
        ? null
        : { number, expandedPercent, ...(k === null ? {} : { k }) },
  };
}

function pipeOf(values: InstallationValues): InstallationBody["pipe"] {
  const walls = readWalls(values.walls);
  const { circumferenceMm, outsideDiameterMm } = values;
  if (walls === null || walls.length === 0) return null;
  if (circumferenceMm === null && outsideDiameterMm === null) return null;
  return {
    circumferenceMm,
    outsideDiameterMm,
    wallReadingsMm: [...walls],
    liningMm: values.liningMm ?? 0,
    outsideDiameterUncertaintyMm: values.outsideUncertaintyMm ?? undefined,
    gaugeUncertaintyMm: values.gaugeUncertaintyMm ?? undefined,
  };
}

function probesOf(values: InstallationValues): InstallationBody["probes"] {
  const onPipe = ({ probeId, mounting, depthMm, insulated }: ProbeValues) =>
    probeId === NONE || mounting === null
      ? null
      : { probeId, mounting, insulated, depthMm: mounting === "pocket" ? depthMm : null };
  const [supply, back] = [onPipe(values.supply), onPipe(values.return)];
  return supply && back ? { supply, return: back } : null;
}
