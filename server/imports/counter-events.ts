import type { RepairStep, RepairStepCode } from "@shared/domain/log-files/repair-step";
import {
  counterMeans,
  hasCounters,
  type CounterChannel,
  type CounterEvent,
  type CounterEventKind,
} from "@shared/domain/readings/counter-steps";
import { meterFacts, type MeterPlace } from "@server/readings/meter-facts";
import { indexFrom } from "@server/readings/load-segments";
import type { CheckedFile } from "./file-checks";

const codes: Readonly<Record<CounterEventKind, RepairStepCode>> = {
  rollover: "counterRollover",
  reset: "counterReset",
  jump: "counterJump",
  exchange: "counterExchange",
};
const meanings: Readonly<
  Record<CounterChannel, "volumeCounter" | "heatingCounter" | "coolingCounter">
> = {
  volumeCounterM3: "volumeCounter",
  heatingCounterKwh: "heatingCounter",
  coolingCounterKwh: "coolingCounter",
};
const mostExamples = 20;

/** Steps of a file's counters that were more than a rise: rollovers, and those that stay unknown. */
export function counterEventSteps(file: CheckedFile, place: MeterPlace): RepairStep[] {
  const { columns, resolved, kind, recipe } = file;
  const facts = meterFacts(recipe, place);
  if (columns === null || facts === null || !hasCounters(columns)) return [];
  const { events } = counterMeans(columns, kind, resolved.nominalStepMs ?? 0, facts);
  return (Object.keys(codes) as CounterEventKind[]).flatMap((eventKind) => {
    const found = events.filter((event) => event.kind === eventKind);
    return found.length === 0 ? [] : [stepOf(file, codes[eventKind], found)];
  });
}

function stepOf(
  file: CheckedFile,
  code: RepairStepCode,
  events: readonly CounterEvent[],
): RepairStep {
  const header = (channel: CounterChannel) =>
    file.recipe.columns.find(({ meaning }) => meaning === meanings[channel])?.header ?? "";
  const countByKind: Record<string, number> = {};
  for (const { channel } of events)
    countByKind[header(channel)] = (countByKind[header(channel)] ?? 0) + 1;
  const examples = events.slice(0, mostExamples).map(({ channel, instantMs }) => {
    const row = indexFrom(file.columns?.instantMs ?? new Float64Array(0), instantMs);
    const written = file.original.find(({ meaning }) => meaning === meanings[channel])?.values;
    return {
      line: file.line[row] ?? 0,
      column: header(channel),
      cell: `${written?.[row - 1] ?? ""} → ${written?.[row] ?? ""}`,
      instantMs,
    };
  });
  return { code, count: events.length, examples, countByKind };
}
