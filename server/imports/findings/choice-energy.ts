import type { CorrectionChange } from "@shared/contracts/corrections";
import {
  correctSegments,
  type SegmentCorrection,
} from "@shared/domain/readings/corrections/correct-segments";
import type { ReadingSegment } from "@shared/domain/readings/reading-columns";
import { resolveSegments, type ReadingSource } from "@shared/domain/readings/resolve-segments";
import type { Interval } from "@shared/domain/time/interval";
import { localDaysBetween } from "@shared/domain/time/local-calendar";
import { calculateSpan } from "@server/readings/calculate-energy";
import type { EnergySettings } from "@server/readings/energy-settings";
import { trimSegments } from "@server/readings/load-segments";
import { spanOf, spanOfChange } from "@server/readings/point-corrections";
import type { CheckedFile } from "../file-checks";
import { sourcesOf } from "../import-sources";
import { onSegments, withClocks } from "./chosen-readings";

/** Both registers, and the water that moved. */
export interface Registers {
  readonly heatingKwh: number;
  readonly coolingKwh: number;
  readonly volumeM3: number;
}

/** What the energy of changed readings is worked out from. */
export interface WeighingInput {
  readonly files: readonly CheckedFile[];
  /** Readings of the point that other imports stored, and how the files stand against them. */
  readonly stored: readonly ReadingSource[];
  readonly precedence: number;
  readonly settings: EnergySettings;
  readonly standing: readonly SegmentCorrection[];
  /** The time the files speak for. */
  readonly span: Interval;
  /** Called after each stretch of days that was integrated; may throw to stop the work. */
  readonly onStep: () => void;
}

export interface WholeEnergy extends Registers {
  /** What the loop's cut-offs leave out. */
  readonly suppressedKwh: number;
}

/** What a change does to the energy, and over which time that was looked at. */
export interface Weight extends Interval {
  readonly before: Registers;
  readonly after: Registers;
}

/** Rows beyond a change on either side whose steps it can reach: more than the widest gap. */
const REACH_STEPS = 5;
/** More stretches than this are not looked at one by one. */
const MOST_WINDOWS = 400;
/** A change of more than this share of the time is looked at as a whole. */
const LOCAL_SHARE = 0.5;

/**
 * Works out what changes of an import's readings do to its energy: before and after, integrated only
 * over the stretches they reach where they are local, and over all of the files' time where not. The
 * same function serves the check and the commit.
 */
export class ChoiceEnergy {
  private readonly resolved = new Map<string, readonly ReadingSegment[]>();
  private readonly wholes = new Map<string, WholeEnergy | null>();
  /** Rows integrated so far: what it has cost. */
  rowsIntegrated = 0;

  constructor(private readonly input: WeighingInput) {}

  /** Readings with changes on them and what corrects the point already. */
  segmentsWith(changes: readonly CorrectionChange[]): readonly ReadingSegment[] {
    return correctSegments(this.uncorrected(changes), [
      ...this.input.standing,
      ...onSegments(changes),
    ]);
  }

  /** Tells that what some changes come to over the whole time is known already. */
  remember(changes: readonly CorrectionChange[], energy: WholeEnergy | null): void {
    this.wholes.set(this.keyOf(changes), energy);
  }

  /** Null where the loop's fluid gives no energy. */
  weigh(
    before: readonly CorrectionChange[],
    after: readonly CorrectionChange[],
    changed: readonly CorrectionChange[],
  ): Weight | null {
    const windows = this.windowsOf(changed);
    if (windows === null) {
      const [one, other] = [this.whole(before), this.whole(after)];
      return one && other
        ? { ...this.input.span, before: registersOf(one), after: registersOf(other) }
        : null;
    }
    const sums = { before: { ...nothing }, after: { ...nothing } };
    for (const window of windows) {
      const [one, other] = [this.within(before, window), this.within(after, window)];
      if (one === null || other === null) return null;
      add(sums.before, one);
      add(sums.after, other);
    }
    const [first] = windows;
    const last = windows.at(-1);
    return first && last ? { startMs: first.startMs, endMs: last.endMs, ...sums } : null;
  }

  /** Of files that are read otherwise, such as in another unit: nothing of it is remembered. */
  wholeOf(
    files: readonly CheckedFile[],
    changes: readonly CorrectionChange[],
    settings = this.input.settings,
  ): WholeEnergy | null {
    const sources = this.sourcesFor(withClocks(files, changes));
    const segments = correctSegments(resolveSegments(sources), [
      ...this.input.standing,
      ...onSegments(changes),
    ]);
    return this.integrate(segments, this.wholeWindow(), settings);
  }

  /** Energy over all of the files' time; null where the loop's fluid gives none. */
  whole(changes: readonly CorrectionChange[]): WholeEnergy | null {
    const key = this.keyOf(changes);
    const known = this.wholes.get(key);
    if (known !== undefined) return known;
    const segments = this.segmentsWith(changes);
    const energy = this.integrate(segments, this.wholeWindow(), this.input.settings);
    this.wholes.set(key, energy);
    return energy;
  }

  /** What was swapped matters to a probe's offset alone. */
  private keyOf(changes: readonly CorrectionChange[]): string {
    const hasOffset = this.input.standing.some(({ kind }) => kind === "probeOffset");
    return JSON.stringify(
      changes.map((change) =>
        change.kind === "swapSides" && !hasOffset ? { ...change, swapped: null } : change,
      ),
    );
  }

  private within(changes: readonly CorrectionChange[], window: Interval): Registers | null {
    const rows = trimSegments(this.uncorrected(changes), window.startMs, window.endMs);
    const near = [...this.input.standing, ...onSegments(changes)].filter((correction) =>
      correction.kind === "split"
        ? isWithin(correction.atMs, window)
        : correction.span.startMs < window.endMs && window.startMs < correction.span.endMs,
    );
    return this.integrate(correctSegments(rows, near), window, this.input.settings);
  }

  private integrate(
    segments: readonly ReadingSegment[],
    window: Interval,
    settings: EnergySettings,
  ): WholeEnergy | null {
    this.rowsIntegrated += segments.reduce((sum, s) => sum + s.columns.instantMs.length, 0);
    const days = localDaysBetween(window, settings.zone);
    const { onStep } = this.input;
    const totals = calculateSpan(segments, settings, days, window, onStep)?.totals;
    if (!totals) return null;
    const { heating, cooling, suppressedKwh, volumeM3 } = totals;
    return {
      heatingKwh: heating.energyKwh,
      coolingKwh: cooling.energyKwh,
      volumeM3,
      suppressedKwh,
    };
  }

  private uncorrected(changes: readonly CorrectionChange[]): readonly ReadingSegment[] {
    const clocks = changes.filter(({ kind }) => kind === "clock");
    const key = JSON.stringify(clocks);
    const known = this.resolved.get(key);
    if (known) return known;
    const segments = resolveSegments(this.sourcesFor(withClocks(this.input.files, clocks)));
    this.resolved.set(key, segments);
    return segments;
  }

  private sourcesFor(files: readonly CheckedFile[]): ReadingSource[] {
    const { stored, precedence, settings } = this.input;
    return [...stored, ...sourcesOf(files, precedence, settings.meterPlace)];
  }

  private wholeWindow(): Interval {
    const { startMs, endMs } = this.input.span;
    return { startMs, endMs: endMs + 1 };
  }

  /** The stretches that changes reach, apart and ascending; null for all of the time. */
  private windowsOf(changes: readonly CorrectionChange[]): Interval[] | null {
    const spans: Interval[] = [];
    for (const change of changes) {
      const span = spanOfChange(change);
      if (span === null) return null;
      const parts = change.kind === "exclude" ? change.parts : undefined;
      spans.push(...(parts ? parts.map(spanOf) : [span]));
    }
    const segments = this.uncorrected(changes);
    const stepMs = Math.max(0, ...segments.map(({ nominalStepMs }) => nominalStepMs));
    const reachMs = REACH_STEPS * stepMs;
    const windows: { startMs: number; endMs: number }[] = [];
    for (const { startMs, endMs } of [...spans].sort((a, b) => a.startMs - b.startMs)) {
      const last = windows.at(-1);
      const from = startMs - reachMs;
      if (last && from <= last.endMs) last.endMs = Math.max(last.endMs, endMs + reachMs);
      else windows.push({ startMs: from, endMs: endMs + reachMs });
    }
    const length = windows.reduce((sum, { startMs, endMs }) => sum + endMs - startMs, 0);
    const { span } = this.input;
    const isLocal =
      windows.length <= MOST_WINDOWS && length <= LOCAL_SHARE * (span.endMs - span.startMs);
    return isLocal ? windows : null;
  }
}

const registersOf = ({ heatingKwh, coolingKwh, volumeM3 }: Registers): Registers => ({
  heatingKwh,
  coolingKwh,
  volumeM3,
});
const nothing: Registers = { heatingKwh: 0, coolingKwh: 0, volumeM3: 0 };

const isWithin = (ms: number, { startMs, endMs }: Interval) => startMs <= ms && ms < endMs;

function add(
  sums: { -readonly [Name in keyof Registers]: Registers[Name] },
  more: Registers,
): void {
  sums.heatingKwh += more.heatingKwh;
  sums.coolingKwh += more.coolingKwh;
  sums.volumeM3 += more.volumeM3;
}
