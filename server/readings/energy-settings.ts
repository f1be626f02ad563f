import { QueryTypes, type Transaction } from "sequelize";
import type { Fluid, GlycolTestMethod, LoopService } from "@shared/contracts/places";
import type { CutOffs, MeterSide, PowerOptions } from "@shared/domain/energy/power";
import {
  absolutePressureMPa,
  fluidForEnergy,
  type FluidForEnergy,
  type LoopPressure,
} from "@shared/domain/fluids/loop-fluid";
import type { Database } from "@server/database/connect";
import { NotFound } from "@server/http/errors";
import { meterPlaceColumns, SERVICE_OF_ENERGY, type MeterPlace } from "./meter-facts";

/** Everything about a point that its energy depends on besides its readings. */
export interface EnergySettings {
  readonly organisationId: string;
  readonly pointId: string;
  /** IANA zone of the site: where its days begin. */
  readonly zone: string;
  readonly service: LoopService;
  readonly meterSide: MeterSide;
  readonly cutOffs: CutOffs;
  readonly pressure: LoopPressure;
  /** As the loop says it. */
  readonly loopFluid: Fluid;
  readonly fluid: FluidForEnergy;
  /** What a permanent meter at the point can count, and what its gaps are. */
  readonly meterPlace: MeterPlace;
}

interface Row extends MeterPlace {
  organisationId: string;
  zone: string;
  meterSide: MeterSide;
  fluidKind: "water" | "ethyleneGlycol" | "propyleneGlycol";
  glycolPercent: number | null;
  glycolBasis: "mass" | "volume" | null;
  testedOn: string | null;
  testMethod: GlycolTestMethod | null;
  gaugePressure: number | null;
  flowCutOff: number | null;
  deltaTCutOff: number | null;
}

/** @throws NotFound where there is no such point. */
export async function loadEnergySettings(
  database: Database,
  pointId: string,
  transaction?: Transaction,
): Promise<EnergySettings> {
  const [row] = await database.query<Row>(
    `SELECT p.organisation_id AS organisationId, s.zone AS zone, ${meterPlaceColumns},
            p.meter_side AS meterSide, l.fluid_kind AS fluidKind,
            l.glycol_percent AS glycolPercent, l.glycol_basis AS glycolBasis,
            DATE_FORMAT(l.glycol_tested_on, '%Y-%m-%d') AS testedOn, l.glycol_test_method AS testMethod,
            l.gauge_pressure_mpa AS gaugePressure, l.flow_cut_off_m3_per_hour AS flowCutOff,
            l.delta_t_cut_off_k AS deltaTCutOff
       FROM metering_point p JOIN \`loop\` l ON l.id = p.loop_id JOIN site s ON s.id = l.site_id
      WHERE p.id = :pointId`,
    { replacements: { pointId }, type: QueryTypes.SELECT, transaction },
  );
  if (!row) throw new NotFound("metering point");
  const fluid =
    row.fluidKind === "water"
      ? ({ kind: "water" } as const)
      : {
          kind: row.fluidKind,
          // Unknown is refused with a reason, never taken for 0 %.
          percent: row.glycolBasis === null ? NaN : (row.glycolPercent ?? NaN),
          basis: row.glycolBasis ?? ("mass" as const),
          testedOn: row.testedOn,
          testMethod: row.testMethod,
        };
  return {
    organisationId: row.organisationId,
    pointId,
    zone: row.zone,
    service: row.service,
    meterSide: row.meterSide,
    meterPlace: {
      service: row.service,
      designFlowM3PerHour: row.designFlowM3PerHour,
      designDeltaTK: row.designDeltaTK,
      insideDiameterMm: row.insideDiameterMm,
      gapRule: row.gapRule,
    },
    cutOffs: { flowM3PerHour: row.flowCutOff, deltaTK: row.deltaTCutOff },
    pressure: absolutePressureMPa(row.gaugePressure),
    loopFluid: fluid,
    fluid: fluidForEnergy(fluid, row.gaugePressure),
  };
}

/** How power is to be formed, or null where the loop's fluid gives no energy. */
export function powerOptionsOf(settings: EnergySettings): PowerOptions | null {
  if (!settings.fluid.ok) return null;
  const service = SERVICE_OF_ENERGY[settings.service];
  const { meterSide, cutOffs } = settings;
  return { fluid: settings.fluid.fluid, meterSide, service, cutOffs };
}
