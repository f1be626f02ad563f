import { integrateEnergy } from "@shared/domain/energy/integrate";
import { NO_CUT_OFFS } from "@shared/domain/energy/power";
import { totalEnergy } from "@shared/domain/energy/totals";
import { waterAtPressure } from "@shared/domain/fluids/water-at-pressure";
import { flowAtVelocityM3PerHour, velocityMPerS } from "@shared/domain/pipes/bore";
import { resolveSegments } from "@shared/domain/readings/resolve-segments";
import { combinePeriod } from "@shared/domain/uncertainty/combine-period";
import { budgetTerm, originOf, standard } from "@shared/domain/uncertainty/budget-term";
import { readingsOf } from "./scenario-readings";

/*
 * What a systematic error does to a week, found the hard way: every reading is shifted by it and the
 * week integrated anew. The budget must say the same from two means alone.
 */
const BORE_MM = 250;

function coolingOf(week: string, addK: number, addMPerS: number) {
  const columns = readingsOf(`test/fixtures/scenarios/S07/${week}.csv`, "interval_start_utc");
  const addFlow = flowAtVelocityM3PerHour(addMPerS, BORE_MM);
  const shifted = {
    ...columns,
    returnC: columns.returnC!.map((each) => each + addK),
    flowM3PerHour: columns.flowM3PerHour!.map((each) => each + addFlow),
  };
  const segments = resolveSegments([
    { precedence: 0, kind: "meanFromLabel", nominalStepMs: null, columns: shifted },
  ]);
  return totalEnergy(
    integrateEnergy(segments, {
      fluid: waterAtPressure(1.6),
      meterSide: "return",
      service: "cooling",
      cutOffs: NO_CUT_OFFS,
    }),
  ).cooling;
}

const origin = originOf("default", "driftAssumed", { halfWidthPercent: 1 });

test.each(["week_A", "week_B"])("an offset shifts %s by as much as its budget says", (week) => {
  const cooling = coolingOf(week, 0, 0);
  for (const [term, addK, addMPerS] of [
    [budgetTerm("probePair", standard(0.1, "K"), origin), 0.1, 0],
    [budgetTerm("zero", standard(0.01, "m/s"), origin), 0, 0.01],
  ] as const) {
    const combined = combinePeriod(
      { terms: [term], boreMm: BORE_MM, autocorrelation: 0 },
      {
        figure: "energy",
        value: cooling.energyKwh,
        flowWeightedDeltaTK: cooling.flowDeltaTM3K / cooling.volumeM3,
        deltaTWeightedVelocityMPerS: velocityMPerS(
          cooling.flowDeltaTM3K / (cooling.deltaTKs / 3600),
          BORE_MM,
        ),
        meanVelocityMPerS: null,
        samples: 168,
        flowSpreadM3PerHour: null,
        deltaTSpreadK: null,
      },
    );
    const change = coolingOf(week, addK, addMPerS).energyKwh - cooling.energyKwh;
    expect(change).toBeGreaterThan(0);
    // Heat per kelvin varies by some tenths of a per cent over the readings.
    expect(Math.abs(combined!.expanded / 2 / change - 1)).toBeLessThan(0.005);
  }
});
