import type {
  MeterClaim,
  MeterComparisonBody,
  MeterComparisonInput,
  MeterSide,
} from "@shared/contracts/meter-comparisons";
import { isLocalDate } from "@shared/domain/time/local-calendar";
import { instantOf, wallTimeOf, type WallTime } from "@shared/domain/time/wall-time";

/** A register's two reads as they are typed; null while empty. */
export interface RegisterValues {
  readonly opening: number | null;
  readonly closing: number | null;
  readonly multiplier: number | null;
  readonly digits: number | null;
  readonly rolledOver: boolean;
}
export type EnergyUnitName = Extract<MeterSide, { kind: "register" }>["energy"]["unit"];
export type VolumeUnitName = NonNullable<
  Extract<MeterSide, { kind: "register" }>["volume"]
>["unit"];

export interface SideValues {
  readonly kind: MeterSide["kind"];
  readonly pointId: string | null;
  readonly register: "heating" | "cooling" | null;
  /** Serial of a permanent meter, or what a typed energy is of. */
  readonly name: string;
  readonly energy: RegisterValues;
  readonly energyUnit: EnergyUnitName;
  readonly hasVolume: boolean;
  readonly volume: RegisterValues;
  readonly volumeUnit: VolumeUnitName;
  readonly energyKwh: number | null;
  readonly volumeM3: number | null;
  readonly deltaTK: number | null;
  /** Where the ± comes from; `evidence` is for metering points alone. */
  readonly claim: "evidence" | MeterClaim["kind"];
  readonly meterClass: "1" | "2" | "3" | null;
  readonly flowRatio: number | null;
  readonly meanDeltaTK: number | null;
  readonly deltaTMinK: number | null;
  readonly flowCap: "3.5" | "5";
  readonly expandedPercent: number | null;
  readonly volumePercent: number | null;
  readonly deltaTPercent: number | null;
}

export interface StandInValues {
  readonly outageHours: number | null;
  readonly coveredHours: number | null;
  readonly coveredKwh: number | null;
  readonly coveredPercent: number | null;
  readonly byDegreeHours: boolean;
  readonly coveredKh: number | null;
  readonly missingKh: number | null;
  readonly estimatePercent: number | null;
  readonly hasConsent: boolean;
  readonly consentBy: string;
}

export interface ComparisonValues {
  readonly title: string;
  readonly from: WallTime;
  readonly to: WallTime;
  readonly first: SideValues;
  readonly second: SideValues;
  readonly hasStandIn: boolean;
  readonly standIn: StandInValues;
  readonly notes: string;
}

const noRegister: RegisterValues = {
  opening: null,
  closing: null,
  multiplier: 1,
  digits: null,
  rolledOver: false,
};

const noSide: SideValues = {
  kind: "typed",
  pointId: null,
  register: null,
  name: "",
  energy: noRegister,
  energyUnit: "kWh",
  hasVolume: false,
  volume: noRegister,
  volumeUnit: "m3",
  energyKwh: null,
  volumeM3: null,
  deltaTK: null,
  claim: "stated",
  meterClass: null,
  flowRatio: null,
  meanDeltaTK: null,
  deltaTMinK: 3,
  flowCap: "5",
  expandedPercent: null,
  volumePercent: null,
  deltaTPercent: null,
};

const noStandIn: StandInValues = {
  outageHours: null,
  coveredHours: null,
  coveredKwh: null,
  coveredPercent: null,
  byDegreeHours: true,
  coveredKh: null,
  missingKh: null,
  estimatePercent: null,
  hasConsent: false,
  consentBy: "",
};

/** A form nobody has filled in: a point of ours against a permanent meter read by eye. */
export const emptyComparison: ComparisonValues = {
  title: "",
  from: { day: null, time: "00:00" },
  to: { day: null, time: "00:00" },
  first: { ...noSide, kind: "point", claim: "evidence" },
  second: { ...noSide, kind: "register", claim: "class" },
  hasStandIn: false,
  standIn: noStandIn,
  notes: "",
};

/** The form opened from a point: it is the first meter, and the days shown there are the period. */
export function comparisonFrom(asked: {
  readonly point?: string | undefined;
  readonly register?: string | undefined;
  readonly from?: string | undefined;
  readonly until?: string | undefined;
}): ComparisonValues {
  const { point, register, from, until } = asked;
  const day = (date: string | undefined) =>
    date !== undefined && isLocalDate(date) ? { day: date, time: "00:00" } : emptyComparison.from;
  return {
    ...emptyComparison,
    from: day(from),
    to: day(until),
    first: {
      ...emptyComparison.first,
      pointId: point ?? null,
      register: register === "heating" || register === "cooling" ? register : null,
    },
  };
}

/** What is still missing before anything can be worked out, as keys of the words. */
export type MissingPart = "period" | "first" | "second" | "standIn";

export type ReadComparison =
  | { readonly ok: true; readonly body: MeterComparisonBody }
  | { readonly ok: false; readonly missing: readonly MissingPart[] };

/**
 * The body of a request from what is typed, with `untitled` for a name where there is none yet.
 * Local midnights go as dates, so that whole days are asked of the site's zone.
 */
export function readComparison(
  values: ComparisonValues,
  zone: string,
  untitled: string,
): ReadComparison {
  const from = instantOf(values.from, zone);
  const to = instantOf(values.to, zone);
  const first = sideOf(values.first);
  const second = sideOf(values.second);
  const standIn = values.hasStandIn ? standInOf(values.standIn) : null;
  const isMissing: Readonly<Record<MissingPart, boolean>> = {
    period: from === null || to === null,
    first: first === null,
    second: second === null,
    standIn: values.hasStandIn && standIn === null,
  };
  const missing = (Object.keys(isMissing) as MissingPart[]).filter((part) => isMissing[part]);
  if (from === null || to === null || first === null || second === null || missing.length > 0)
    return { ok: false, missing };
  const bothMidnight = isMidnight(values.from) && isMidnight(values.to);
  return {
    ok: true,
    body: {
      title: values.title.trim() || untitled,
      from: bothMidnight ? (values.from.day ?? from) : from,
      to: bothMidnight ? (values.to.day ?? to) : to,
      first,
      second,
      standIn,
      notes: values.notes.trim() || null,
    },
  };
}

function isMidnight({ time }: WallTime): boolean {
  return /^\s*0?0[:.]00\s*$/.test(time);
}

type SideBody = MeterComparisonBody["first"];

function sideOf(values: SideValues): SideBody | null {
  switch (values.kind) {
    case "point":
      return pointOf(values);
    case "register":
      return registerOf(values);
    case "typed":
      return typedOf(values);
  }
}

function pointOf({ pointId, register, ...values }: SideValues): SideBody | null {
  if (pointId === null || register === null) return null;
  if (values.claim === "evidence") return { kind: "point", pointId, register };
  const claim = claimOf({ pointId, register, ...values });
  return claim && { kind: "point", pointId, register, claim };
}

function registerOf(values: SideValues): SideBody | null {
  const serial = values.name.trim();
  const energy = readsOf(values.energy);
  const volume = values.hasVolume ? readsOf(values.volume) : null;
  const claim = claimOf(values);
  if (serial === "" || energy === null || claim === null) return null;
  if (values.hasVolume && volume === null) return null;
  return {
    kind: "register",
    serial,
    energy: { ...energy, unit: values.energyUnit },
    volume: volume && { ...volume, unit: values.volumeUnit },
    deltaTK: values.deltaTK,
    claim,
  };
}

function readsOf({ opening, closing, multiplier, digits, rolledOver }: RegisterValues) {
  if (opening === null || closing === null || multiplier === null) return null;
  return { opening, closing, multiplier, digits, rolledOver };
}

function typedOf(values: SideValues): SideBody | null {
  const name = values.name.trim();
  const { energyKwh, expandedPercent, volumeM3, volumePercent, deltaTK, deltaTPercent } = values;
  if (name === "" || energyKwh === null) return null;
  return {
    kind: "typed",
    name,
    energyKwh,
    expandedPercent,
    volumeM3,
    volumePercent,
    deltaTK,
    deltaTPercent,
  };
}

function claimOf(values: SideValues): MeterClaim | null {
  const { expandedPercent, volumePercent, deltaTPercent } = values;
  if (values.claim === "stated")
    return { kind: "stated", expandedPercent, volumePercent, deltaTPercent };
  const { meterClass, flowRatio, meanDeltaTK, deltaTMinK, flowCap } = values;
  if (meterClass === null || flowRatio === null || meanDeltaTK === null || deltaTMinK === null)
    return null;
  return {
    kind: "class",
    meterClass: CLASSES[meterClass],
    flowRatio,
    meanDeltaTK,
    deltaTMinK,
    flowCapPercent: CAPS[flowCap],
  };
}

const CLASSES = { "1": 1, "2": 2, "3": 3 } as const;
const CAPS = { "3.5": 3.5, "5": 5 } as const;

function standInOf(values: StandInValues): NonNullable<MeterComparisonBody["standIn"]> | null {
  const { outageHours, coveredHours, coveredKwh, coveredPercent, estimatePercent } = values;
  if (outageHours === null || coveredHours === null || coveredKwh === null) return null;
  const { coveredKh: covered, missingKh: missing } = values;
  if (values.byDegreeHours && (covered === null || missing === null)) return null;
  return {
    outageHours,
    coveredHours,
    coveredKwh,
    coveredPercent,
    degreeHours:
      values.byDegreeHours && covered !== null && missing !== null ? { covered, missing } : null,
    estimatePercent,
    consentBy: values.hasConsent ? values.consentBy.trim() || null : null,
  };
}

/** What a saved comparison was asked, back in the form: for correcting it. */
export function valuesOf(
  input: MeterComparisonInput,
  period: { readonly from: string; readonly to: string },
  zone: string,
): ComparisonValues {
  const { standIn } = input;
  return {
    title: input.title,
    from: wallTimeOf(period.from, zone),
    to: wallTimeOf(period.to, zone),
    first: sideValues(input.first),
    second: sideValues(input.second),
    hasStandIn: standIn !== null,
    standIn: standIn
      ? {
          outageHours: standIn.outageHours,
          coveredHours: standIn.coveredHours,
          coveredKwh: standIn.coveredKwh,
          coveredPercent: standIn.coveredPercent,
          byDegreeHours: standIn.degreeHours !== null,
          coveredKh: standIn.degreeHours?.covered ?? null,
          missingKh: standIn.degreeHours?.missing ?? null,
          estimatePercent: standIn.estimatePercent,
          hasConsent: standIn.consentBy !== null,
          consentBy: standIn.consentBy ?? "",
        }
      : noStandIn,
    notes: input.notes ?? "",
  };
}

function sideValues(side: MeterSide): SideValues {
  switch (side.kind) {
    case "point": {
      const { pointId, register, claim } = side;
      return { ...noSide, ...claimValues(claim), kind: "point", pointId, register };
    }
    case "register": {
      const { unit: energyUnit, ...energy } = side.energy;
      const { unit: volumeUnit, ...volume } = side.volume ?? { ...noRegister, unit: "m3" as const };
      return {
        ...noSide,
        ...claimValues(side.claim),
        kind: "register",
        name: side.serial,
        energy,
        energyUnit,
        hasVolume: side.volume !== null,
        volume,
        volumeUnit,
        deltaTK: side.deltaTK,
      };
    }
    case "typed":
      return { ...noSide, ...side };
  }
}

function claimValues(claim: MeterClaim | null): Partial<SideValues> {
  if (claim === null) return { claim: "evidence" };
  if (claim.kind === "stated") {
    const { kind, ...said } = claim;
    return { claim: kind, ...said };
  }
  return {
    claim: claim.kind,
    meterClass: `${claim.meterClass}`,
    flowRatio: claim.flowRatio,
    meanDeltaTK: claim.meanDeltaTK,
    deltaTMinK: claim.deltaTMinK,
    flowCap: `${claim.flowCapPercent}`,
  };
}
