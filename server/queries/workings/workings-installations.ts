import type { Workings } from "@shared/contracts/workings";
import { reynoldsNumber } from "@shared/domain/pipes/reynolds-number";
import type { Interval } from "@shared/domain/time/interval";
import { localDateOf } from "@shared/domain/time/local-calendar";
import { conditionVerdicts } from "@shared/domain/uncertainty/conditions";
import { instantText } from "@server/database/conversions";
import type { EnergyPoint } from "@server/queries/energy/energy-point";
import { isPairCorrected, type FigureEvidence } from "./figure-evidence";
import { quotient, type FigurePart } from "./figure-uncertainty";

/** Applied corrections that put the flow right by the bore. */
export interface BoreCorrection extends Interval {
  readonly kind: "scaleByBore";
}

type Shown = Workings["installations"][number];

/** The installations behind a figure, each with the share it speaks for and what was found of it. */
export function presentInstallations(
  energyPoint: EnergyPoint,
  evidence: FigureEvidence,
  parts: readonly FigurePart[],
  about: { readonly coverage: number | null; readonly boreCorrected: boolean },
): Shown[] {
  const coveredS = parts.reduce((total, { sums }) => total + sums.coveredS, 0);
  // Water and a meter may both have spoken in one installation's time: it is shown once.
  const shown = new Map<string, Shown>();
  for (const figurePart of parts) {
    const { installation } = figurePart.part;
    if (installation === null) continue;
    const { flowMeter, probes } = installation.evidence;
    const before = shown.get(installation.id);
    const verdicts = verdictsOf(energyPoint, evidence, figurePart, about);
    shown.set(installation.id, {
      id: installation.id,
      version: installation.version,
      startsAt: instantText(new Date(installation.startMs)),
      endsAt: installation.endMs === null ? null : instantText(new Date(installation.endMs)),
      recordedBy: installation.recordedBy,
      flowMeterSerial: flowMeter?.serial ?? null,
      supplyProbeSerial: probes?.supply.serial ?? null,
      returnProbeSerial: probes?.return.serial ?? null,
      bathCheckId: installation.bathCheckId,
      share: (before?.share ?? 0) + (quotient(figurePart.sums.coveredS, coveredS) ?? 0),
      verdicts: [
        ...(before?.verdicts ?? []),
        ...verdicts.filter(({ code }) => !before?.verdicts.some((one) => one.code === code)),
      ],
    });
  }
  return [...shown.values()];
}

/** What a permanent meter's own power depends on: its limits hold flow, temperatures and mounting. */
const OF_A_METER: ReadonlySet<string> = new Set(["certificate", "clock", "fluid", "completeness"]);

function verdictsOf(
  energyPoint: EnergyPoint,
  { zone, intervalS, offsets, held, background }: FigureEvidence,
  { part, sums, budget, velocityMPerS, measuredBy }: FigurePart,
  about: { readonly coverage: number | null; readonly boreCorrected: boolean },
): Shown["verdicts"] {
  const { installation } = part;
  const certified = installation?.evidence.meterPlate?.certificate != null;
  const verdicts = conditionVerdicts({
    evidence: installation?.evidence ?? null,
    budget,
    fluid: background.loop.fluid,
    state: {
      velocityMPerS,
      reynolds: reynoldsOf(energyPoint, sums, velocityMPerS, budget.boreMm),
      deltaTK: quotient(sums.flowDeltaTM3K, sums.volumeM3),
    },
    enteredBoreMm: installation?.fields.enteredBoreMm ?? null,
    enteredBoreCorrected: about.boreCorrected,
    onDate: localDateOf(sums.lastCoveredMs ?? part.startMs, zone),
    intervalS,
    pairDifferenceCorrected: isPairCorrected(part, { offsets, held }),
    completeness: about.coverage,
  });
  return verdicts
    .filter(({ check }) => measuredBy === "water" || OF_A_METER.has(check))
    .filter(({ code }) => !(certified && code === "certificateMissing"))
    .map((verdict) => ({ ...verdict, values: { ...verdict.values } }));
}

function reynoldsOf(
  { settings, point }: EnergyPoint,
  { meanSupplyC, meanReturnC }: FigurePart["sums"],
  velocityMPerS: number | null,
  boreMm: number | null,
): number | null {
  const meterC = point.meterSide === "supply" ? meanSupplyC : meanReturnC;
  if (!settings.fluid.ok || meterC === null || velocityMPerS === null || boreMm === null)
    return null;
  const { fluid } = settings.fluid;
  if (meterC < fluid.lowestC || meterC > fluid.highestC) return null;
  return reynoldsNumber({
    velocityMPerS,
    boreMm,
    densityKgPerM3: fluid.density(meterC),
    viscosityPaS: fluid.viscosityPaS(meterC),
  });
}
