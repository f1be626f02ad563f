import type { RowRange } from "../corrections/correction-span";
import { MINUTE_MS } from "../../time/interval";
import { RowQuality, type ReadingSegment } from "../reading-columns";
import { KEEP, type Finding, type FindingChoice } from "./finding";
import { noFlowBelowM3PerHour, type NoFlowLimits } from "./no-flow";
import { medianOf, readRows, rowWeightMs } from "./read-rows";
import { placeOf, wholePlace } from "./row-spans";

/**
 * Negative flow, told apart by how steady it is.
 *
 * - `reversedFlow`: negative for more than 90 % of the time with flow. Either the transducers are
 *   mounted against the water, or it really runs that way; the choice is one sign for the whole
 *   series, never |flow| row by row.
 * - `backflow`: otherwise, runs of negative flow of at most 10 minutes or 2 readings that touch a
 *   start or stop. Water does run back when a pump stops; nothing has to be done.
 * - `flowTurns`: other runs. The direction changed while water moved: a remount, or a pipe in which it
 *   turns. Where the one run reaches an end of the series, turning its sign is offered.
 *
 * "With flow" is beyond the zero uncertainty, either way.
 *
 * Example: −31.2, −30.8, −31.0 m³/h → `reversedFlow`, 100 %, median −31.0.
 */
export const REVERSED_SHARE = 0.9;
const LONGEST_BACKFLOW_MS = 10 * MINUTE_MS;
const LONGEST_BACKFLOW_READINGS = 2;

export type NegativeFlowFinding = Finding<
  "reversedFlow" | "backflow" | "flowTurns",
  {
    readonly negativeSharePercent: number;
    /** Of the negative readings. */
    readonly medianM3PerHour: number;
    readonly runs: number;
  }
>;

export function reversedFlow(segment: ReadingSegment, limits: NoFlowLimits): NegativeFlowFinding[] {
  const { flowM3PerHour: flow, quality } = segment.columns;
  const rows = readRows(segment, flow);
  if (!flow || !rows) return [];
  const noFlow = noFlowBelowM3PerHour(limits);
  let flowingMs = 0;
  let negativeMs = 0;
  for (const row of rows) {
    const value = flow[row]!;
    if (Math.abs(value) <= noFlow) continue;
    const weight = rowWeightMs(segment, row);
    flowingMs += weight;
    if (value < 0) negativeMs += weight;
  }
  if (negativeMs === 0) return [];
  const negativeSharePercent = (negativeMs / flowingMs) * 100;
  const figuresOf = (runs: readonly RowRange[]) => {
    const negative: number[] = [];
    for (const { from, to } of runs)
      for (let row = from; row < to; row++)
        if (flow[row]! < -noFlow && quality[row] === RowQuality.measured) negative.push(flow[row]!);
    return {
      negativeSharePercent,
      medianM3PerHour: medianOf(Float64Array.from(negative))!,
      runs: runs.length,
    };
  };
  if (negativeMs > REVERSED_SHARE * flowingMs) {
    const place = wholePlace(segment);
    return [
      {
        code: "reversedFlow",
        weight: "stop",
        channel: "flowM3PerHour",
        ...place,
        figures: figuresOf(place.rows),
        choices: [{ change: "flipFlow", span: place.spans[0]! }, KEEP],
      },
    ];
  }
  const runs = negativeRuns(segment, flow, rows, noFlow);
  const found = (code: "backflow" | "flowTurns", chosen: readonly RowRange[]) => {
    if (chosen.length === 0) return [];
    const place = placeOf(segment, chosen);
    const [only] = chosen;
    const reachesEnd =
      chosen.length === 1 && (only!.from === rows[0]! || only!.to === rows.at(-1)! + 1);
    const flip: readonly FindingChoice[] =
      code === "flowTurns" && reachesEnd ? [{ change: "flipFlow", span: place.spans[0]! }] : [];
    const exclude: FindingChoice = { change: "exclude", spans: place.spans };
    return [
      {
        code,
        weight: code === "backflow" ? "note" : "look",
        channel: "flowM3PerHour",
        ...place,
        figures: figuresOf(chosen),
        choices: code === "backflow" ? [KEEP, exclude] : [...flip, exclude, KEEP],
      } satisfies NegativeFlowFinding,
    ];
  };
  return [
    ...found("flowTurns", runs.filter((run) => !run.atStartOrStop).map(plain)),
    ...found("backflow", runs.filter((run) => run.atStartOrStop).map(plain)),
  ];
}

const plain = ({ from, to }: RowRange): RowRange => ({ from, to });

interface NegativeRun extends RowRange {
  readonly atStartOrStop: boolean;
}

function negativeRuns(
  segment: ReadingSegment,
  flow: Float64Array,
  rows: Uint32Array,
  noFlow: number,
): NegativeRun[] {
  const { instantMs } = segment.columns;
  const runs: NegativeRun[] = [];
  let start = -1;
  for (let at = 0; at <= rows.length; at++) {
    const isNegative = at < rows.length && flow[rows[at]!]! < -noFlow;
    if (isNegative && start < 0) start = at;
    if (isNegative || start < 0) continue;
    const from = rows[start]!;
    const last = rows[at - 1]!;
    const isShort =
      at - start <= LONGEST_BACKFLOW_READINGS ||
      instantMs[last]! - instantMs[from]! <= LONGEST_BACKFLOW_MS;
    const standsBeside = [start - 1, at].some((beside) => {
      const row = rows[beside];
      return row !== undefined && Math.abs(flow[row]!) <= noFlow;
    });
    runs.push({ from, to: last + 1, atStartOrStop: isShort && standsBeside });
    start = -1;
  }
  return runs;
}
