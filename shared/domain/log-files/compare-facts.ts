import type { FactKind, PreambleFact } from "./preamble-facts";
import { plainSerial } from "./plain-serial";
import { isSerial } from "./preamble-facts";

/** What the record of a point says, by the kind of fact it can be held against; null where it is silent. */
export interface RecordedFacts {
  readonly meterSerial: string | null;
  readonly loggerSerials: readonly string[];
  readonly supplyProbeSerial: string | null;
  readonly returnProbeSerial: string | null;
  /** The bore set on the meter where somebody noted it, else the bore of the pipe. */
  readonly boreMm: number | null;
  readonly outsideDiameterMm: number | null;
  readonly wallMm: number | null;
  readonly soundSpeedMPerS: number | null;
  readonly fluid: "water" | "glycol" | null;
  /** Usual step of the file's own rows. */
  readonly intervalS: number | null;
  readonly siteNames: readonly string[];
  readonly pointNames: readonly string[];
}

export type FactVerdict =
  | "matches"
  | "differs"
  /** The record is silent: the fact may be taken over. */
  | "notRecorded"
  /** What the file says cannot be read for sure. */
  | "unclear"
  /** Shown for a person to know; there is nothing to hold it against. */
  | "shown";

export interface ComparedFact extends PreambleFact {
  readonly verdict: FactVerdict;
  /** What the record says, for the person who compares. */
  readonly recorded: string | number | null;
  /** How much it matters that it differs; null where it does not. */
  readonly weight: "stop" | "look" | null;
}

/** Differences up to these are rounding or reading: of the bore 1 % is 2 % of the flow. */
const TOLERANCE_PERCENT = {
  boreMm: 1,
  outsideDiameterMm: 1,
  wallMm: 5,
  soundSpeedMPerS: 1,
  intervalS: 1,
} as const;

/**
 * Holds what a file says against the record. A bore off by more than 1 % stops: flow goes with its
 * square. Another serial is worth a look: the file may be another point's.
 */
export function compareFacts(
  facts: readonly PreambleFact[],
  recorded: RecordedFacts,
): readonly ComparedFact[] {
  return facts.map((fact) => {
    const { verdict, record } = judge(fact, recorded);
    const weight = verdict !== "differs" ? null : fact.kind === "boreMm" ? "stop" : "look";
    return { ...fact, verdict, recorded: record, weight };
  });
}

interface Judgement {
  readonly verdict: FactVerdict;
  readonly record: string | number | null;
}

function judge(fact: PreambleFact, recorded: RecordedFacts): Judgement {
  const { kind } = fact;
  if (isSerial(kind)) return judgeSerial(fact, serialsOf(kind, recorded));
  switch (kind) {
    case "boreMm":
    case "outsideDiameterMm":
    case "wallMm":
    case "soundSpeedMPerS":
      return judgeNumber(fact, recorded[kind], TOLERANCE_PERCENT[kind]);
    case "intervalS": {
      const judged = judgeNumber(fact, recorded.intervalS, TOLERANCE_PERCENT.intervalS);
      return judged.verdict === "notRecorded" ? { verdict: "shown", record: null } : judged;
    }
    case "fluid":
      return judgeFluid(fact, recorded.fluid);
    case "siteName":
      return judgeName(fact, recorded.siteNames);
    case "pointName":
      return judgeName(fact, recorded.pointNames);
    default:
      return { verdict: "shown", record: null };
  }
}

/** What a serial may be: a file that names no instrument may come from any that was there. */
function serialsOf(kind: FactKind, recorded: RecordedFacts): readonly string[] {
  const { meterSerial, loggerSerials, supplyProbeSerial, returnProbeSerial } = recorded;
  const probes = [supplyProbeSerial, returnProbeSerial];
  const known = {
    meterSerial: [meterSerial],
    loggerSerial: loggerSerials,
    supplyProbeSerial: [supplyProbeSerial],
    returnProbeSerial: [returnProbeSerial],
    probeSerial: probes,
    serial: [meterSerial, ...loggerSerials],
  } as const;
  const asked = kind in known ? known[kind as keyof typeof known] : [];
  return asked.flatMap((serial) => serial ?? []);
}

function judgeSerial({ cell }: PreambleFact, serials: readonly string[]): Judgement {
  const [first] = serials;
  if (first === undefined) return { verdict: "notRecorded", record: null };
  const same = serials.find((serial) => plainSerial(serial) === plainSerial(cell));
  return same === undefined
    ? { verdict: "differs", record: [...new Set(serials)].join(", ") }
    : { verdict: "matches", record: same };
}

function judgeNumber(
  { value }: PreambleFact,
  record: number | null,
  tolerancePercent: number,
): Judgement {
  if (value === null) return { verdict: "unclear", record };
  if (record === null) return { verdict: "notRecorded", record };
  const off = (Math.abs(value - record) / record) * 100;
  return { verdict: off <= tolerancePercent ? "matches" : "differs", record };
}

const WATER = /^(tap |pure |hot |cold |chilled |heizungs|kalt)?(water|wasser)$/i;
const GLYCOL = /gl[iy][ck]ol/i;

function judgeFluid({ cell }: PreambleFact, record: RecordedFacts["fluid"]): Judgement {
  const said = GLYCOL.test(cell) ? "glycol" : WATER.test(cell) ? "water" : null;
  if (said === null) return { verdict: "unclear", record };
  if (record === null) return { verdict: "notRecorded", record };
  return { verdict: said === record ? "matches" : "differs", record };
}

/** People shorten and translate names: another one proves nothing. */
function judgeName({ cell }: PreambleFact, names: readonly string[]): Judgement {
  const plain = (text: string) => text.toLowerCase().replace(/[^\p{L}\p{N}]/gu, "");
  const same = names.find((name) => plain(name) === plain(cell));
  return same === undefined
    ? { verdict: "shown", record: names[0] ?? null }
    : { verdict: "matches", record: same };
}
