import type { CorrectionChange } from "@shared/contracts/corrections";
import type { Fluid } from "@shared/contracts/places";
import type { Quantity } from "@shared/domain/units/display-units";
import { instantOf, wallTimeOf, type WallTime } from "@shared/domain/time/wall-time";

export type ChangeKind = CorrectionChange["kind"];
export const changeKinds = [
  "exclude",
  "swapSides",
  "flipFlow",
  "scaleByBore",
  "probeOffset",
  "clock",
  "unit",
  "fluid",
  "split",
] as const satisfies readonly ChangeKind[];

type Exclusion = Extract<CorrectionChange, { kind: "exclude" }>;
export type RuleChannel = NonNullable<Exclusion["rule"]>["channel"];
export const ruleChannels = [
  "flow",
  "supply",
  "return",
  "deltaT",
  "signal",
  "power",
] as const satisfies readonly RuleChannel[];
export type UnitChannel = Extract<CorrectionChange, { kind: "unit" }>["channel"];

/** Quantity of a rule's bound; a signal is in percent everywhere. */
export const quantityOf: Readonly<Record<RuleChannel, Quantity | null>> = {
  flow: "flow",
  supply: "temperature",
  return: "temperature",
  deltaT: "temperatureDifference",
  power: "coolingPower",
  signal: null,
};

/** A correction as the form holds it: numbers in the units on screen, times as on the wall. */
export interface ChangeDraft {
  readonly kind: ChangeKind | null;
  readonly from: WallTime;
  readonly to: WallTime;
  readonly openEnd: boolean;
  readonly byRule: boolean;
  readonly channel: RuleChannel;
  readonly is: "below" | "above";
  readonly bound: number | null;
  readonly logFileId: string | null;
  readonly offsetS: number | null;
  readonly driftSPerDay: number | null;
  readonly probeId: string | null;
  readonly addK: number | null;
  readonly swapped: "probes" | "channels" | null;
  readonly enteredBore: number | null;
  readonly trueBore: number | null;
  readonly unitChannel: UnitChannel | null;
  readonly unit: string | null;
  readonly fluidKind: Fluid["kind"] | null;
  readonly percent: number | null;
  readonly basis: "mass" | "volume";
}

export const emptyDraft: ChangeDraft = {
  kind: null,
  from: { day: null, time: "00:00" },
  to: { day: null, time: "00:00" },
  openEnd: true,
  byRule: false,
  channel: "signal",
  is: "below",
  bound: null,
  logFileId: null,
  offsetS: null,
  driftSPerDay: 0,
  probeId: null,
  addK: null,
  swapped: null,
  enteredBore: null,
  trueBore: null,
  unitChannel: null,
  unit: null,
  fluidKind: null,
  percent: null,
  basis: "mass",
};

/** What an address may ask the form to begin with. */
export type AskedParams = Partial<
  Record<"propose" | "from" | "to" | "entered" | "true" | "probe" | "offset", string>
>;

/** A draft from the address, its numbers in stored units; readings begin at `firstAt`. */
export function draftOf(
  asked: AskedParams,
  firstAt: string | null,
  zone: string,
  toDisplay: (stored: number, quantity: Quantity) => number,
): ChangeDraft {
  const number = (text: string | undefined, quantity: Quantity) => {
    const value = text === undefined || text === "" ? NaN : Number(text);
    return Number.isFinite(value) ? toDisplay(value, quantity) : null;
  };
  const instant = (text: string | undefined) =>
    text !== undefined && !Number.isNaN(Date.parse(text)) ? text : null;
  const from = instant(asked.from) ?? firstAt;
  const to = instant(asked.to);
  return {
    ...emptyDraft,
    kind: changeKinds.find((kind) => kind === asked.propose) ?? null,
    from: from === null ? emptyDraft.from : wallTimeOf(from, zone),
    to: to === null ? emptyDraft.to : wallTimeOf(to, zone),
    openEnd: to === null,
    enteredBore: number(asked.entered, "pipeSize"),
    trueBore: number(asked.true, "pipeSize"),
    probeId: asked.probe ?? null,
    addK: number(asked.offset, "temperatureDifference"),
  };
}

export type DraftField = keyof ChangeDraft;

/** The draft as the API takes it, or the fields that still lack something. */
export function changeOf(
  draft: ChangeDraft,
  zone: string,
  fromDisplay: (typed: number, quantity: Quantity) => number,
): { readonly change: CorrectionChange } | { readonly missing: readonly DraftField[] } {
  const missing: DraftField[] = [];
  function needed<Value>(field: DraftField, value: Value | null): Value {
    if (value === null) missing.push(field);
    // Never used while anything is missing.
    return value as Value;
  }
  const stored = (field: DraftField, typed: number | null, quantity: Quantity | null) =>
    needed(field, typed === null || quantity === null ? typed : fromDisplay(typed, quantity));
  const span = () => ({
    from: needed("from", instantOf(draft.from, zone)),
    to: draft.openEnd ? null : needed("to", instantOf(draft.to, zone)),
  });
  const build = (kind: ChangeKind): CorrectionChange => {
    switch (kind) {
      case "exclude": {
        const { channel, is, bound } = draft;
        const value = draft.byRule ? stored("bound", bound, quantityOf[channel]) : null;
        return { kind, ...span(), rule: value === null ? null : { channel, is, value } };
      }
      case "swapSides":
        return { kind, ...span(), swapped: needed("swapped", draft.swapped) };
      case "flipFlow":
        return { kind, ...span() };
      case "scaleByBore":
        return {
          kind,
          ...span(),
          enteredBoreMm: stored("enteredBore", draft.enteredBore, "pipeSize"),
          trueBoreMm: stored("trueBore", draft.trueBore, "pipeSize"),
        };
      case "probeOffset":
        return {
          kind,
          ...span(),
          probeId: needed("probeId", draft.probeId),
          addK: stored("addK", draft.addK, "temperatureDifference"),
          bathCheckId: null,
        };
      case "clock":
        return {
          kind,
          logFileId: needed("logFileId", draft.logFileId),
          offsetS: needed("offsetS", draft.offsetS),
          driftSPerDay: draft.driftSPerDay ?? 0,
          referenceAt: needed("from", instantOf(draft.from, zone)),
        };
      case "unit":
        return {
          kind,
          logFileId: needed("logFileId", draft.logFileId),
          channel: needed("unitChannel", draft.unitChannel),
          unit: needed("unit", draft.unit),
        };
      case "fluid":
        return { kind, ...span(), fluid: fluidOf(draft, needed) };
      case "split":
        return { kind, at: needed("from", instantOf(draft.from, zone)) };
    }
  };
  const change = draft.kind === null ? null : build(draft.kind);
  if (change === null) return { missing: ["kind"] };
  return missing.length > 0 ? { missing } : { change };
}

function fluidOf(
  { fluidKind, percent, basis }: ChangeDraft,
  needed: <Value>(field: DraftField, value: Value | null) => Value,
): Fluid {
  const kind = needed("fluidKind", fluidKind);
  if (kind === "water") return { kind };
  return { kind, percent: needed("percent", percent), basis, testedOn: null, testMethod: null };
}
