import type { EnergyPlusMinus, PlusMinus, RangePlusMinus } from "@shared/contracts/plus-minus";
import type { Interval } from "@shared/domain/time/interval";
import type { Database } from "@server/database/connect";
import type { Scope } from "@server/database/scoped";
import type { EnergyPoint } from "@server/queries/energy/energy-point";
import type { EnergyRange } from "@server/queries/energy/energy-range";
import { energyRows, type EnergyRow } from "@server/queries/energy/energy-rows";
import type { RegisterName } from "@server/queries/energy/loads";
import { loadFigureEvidence, type FigureEvidence } from "./figure-evidence";
import { figureUncertainty, plusMinusOf, shownPlusMinus } from "./figure-uncertainty";

/** The ± of everything a range adds up to, from the rows its totals are summed from. */
export function rangePlusMinus(
  evidence: FigureEvidence,
  rows: readonly EnergyRow[],
): RangePlusMinus {
  const energies = {
    heating: figureUncertainty(evidence, rows, { figure: "energy", register: "heating" }),
    cooling: figureUncertainty(evidence, rows, { figure: "energy", register: "cooling" }),
  };
  const register = (name: RegisterName) => ({
    energy: shownPlusMinus(energies[name]),
    deltaT: plusMinusOf(evidence, rows, { figure: "deltaT", register: name }),
  });
  const heating = register("heating");
  const cooling = register("cooling");
  const leading: RegisterName = heating.energy === null ? "cooling" : "heating";
  const volume = plusMinusOf(evidence, rows, { figure: "volume", register: leading });
  const lacks = Object.values(energies).includes("noUncertaintyForMeter") ? "meterClass" : null;
  return { heating, cooling, volume, lacks };
}

/** The same, loaded: of any range that starts and ends on quarter-hours. */
export async function loadRangePlusMinus(
  { database, scope }: { readonly database: Database; readonly scope: Scope },
  energyPoint: EnergyPoint,
  range: EnergyRange,
): Promise<RangePlusMinus> {
  const at = { pointId: energyPoint.point.id, zone: energyPoint.site.zone };
  const step = range.dates === null ? "quarterHour" : "day";
  const [evidence, rows] = await Promise.all([
    loadFigureEvidence(scope, energyPoint, range),
    energyRows(database, at, range, step),
  ]);
  return rangePlusMinus(evidence, rows);
}

/** The ± of one row's energy. */
export function rowPlusMinus(evidence: FigureEvidence, row: EnergyRow): EnergyPlusMinus {
  const of = (register: RegisterName) =>
    plusMinusOf(evidence, [row], { figure: "energy", register });
  return { heating: of("heating"), cooling: of("cooling") };
}

/** The ± of a mean power over a window of whole quarter-hours. */
export async function windowPlusMinus(
  database: Database,
  evidence: FigureEvidence,
  window: Interval & { readonly register: RegisterName },
): Promise<PlusMinus | null> {
  const { point, site } = evidence.background;
  const at = { pointId: point.id, zone: site.zone };
  const rows = await energyRows(database, at, { ...window, dates: null }, "quarterHour");
  return plusMinusOf(evidence, rows, { figure: "power", register: window.register });
}
