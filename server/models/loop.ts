import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type NonAttribute,
  type Sequelize,
} from "sequelize";
import type { Fluid, GlycolTestMethod, LoopService } from "@shared/contracts/places";
import { glycolTestMethod, loopService } from "@shared/contracts/places";
import { idColumn, instantColumn, optionalInstant, optionalReference, reference } from "./columns";

const optionalDouble = { type: DataTypes.DOUBLE, allowNull: true, defaultValue: null } as const;

/** One circuit with its own tag; it may name the loop that feeds it. */
export class Loop extends Model<InferAttributes<Loop>, InferCreationAttributes<Loop>> {
  declare id: CreationOptional<string>;
  declare organisationId: string;
  declare siteId: string;
  declare buildingId: CreationOptional<string | null>;
  declare parentLoopId: CreationOptional<string | null>;
  /** As painted on the pipe; unique among the site's loops in use. */
  declare tag: string;
  declare name: string;
  declare service: LoopService;
  declare fluidKind: CreationOptional<Fluid["kind"]>;
  /** Above 0, at most 100; null with water. Energy ends at 60 % by volume. */
  declare glycolPercent: CreationOptional<number | null>;
  declare glycolBasis: CreationOptional<"mass" | "volume" | null>;
  /** Day of the test the percentage comes from; null where nobody said. */
  declare glycolTestedOn: CreationOptional<string | null>;
  declare glycolTestMethod: CreationOptional<GlycolTestMethod | null>;
  /** Null: nobody read the gauge, and 1.6 MPa absolute is assumed. */
  declare gaugePressureMPa: CreationOptional<number | null>;
  declare designFlowM3PerHour: CreationOptional<number | null>;
  declare designDeltaTK: CreationOptional<number | null>;
  /** Null: no cut-off. */
  declare flowCutOffM3PerHour: CreationOptional<number | null>;
  declare deltaTCutOffK: CreationOptional<number | null>;
  declare notes: CreationOptional<string | null>;
  declare archivedAt: CreationOptional<Date | null>;
  declare createdAt: Date;

  static define(sequelize: Sequelize): void {
    Loop.init(
      {
        id: idColumn,
        organisationId: reference,
        siteId: reference,
        buildingId: optionalReference,
        parentLoopId: optionalReference,
        tag: { type: DataTypes.STRING(24), allowNull: false },
        name: { type: DataTypes.STRING(120), allowNull: false },
        service: { type: DataTypes.ENUM(...loopService.options), allowNull: false },
        fluidKind: {
          type: DataTypes.ENUM("water", "ethyleneGlycol", "propyleneGlycol"),
          allowNull: false,
          defaultValue: "water",
        },
        glycolPercent: optionalDouble,
        glycolBasis: {
          type: DataTypes.ENUM("mass", "volume"),
          allowNull: true,
          defaultValue: null,
        },
        glycolTestedOn: { type: DataTypes.DATEONLY, allowNull: true, defaultValue: null },
        glycolTestMethod: {
          type: DataTypes.ENUM(...glycolTestMethod.options),
          allowNull: true,
          defaultValue: null,
        },
        gaugePressureMPa: { ...optionalDouble, field: "gauge_pressure_mpa" },
        designFlowM3PerHour: { ...optionalDouble, field: "design_flow_m3_per_hour" },
        designDeltaTK: { ...optionalDouble, field: "design_delta_t_k" },
        flowCutOffM3PerHour: { ...optionalDouble, field: "flow_cut_off_m3_per_hour" },
        deltaTCutOffK: { ...optionalDouble, field: "delta_t_cut_off_k" },
        notes: { type: DataTypes.STRING(2000), allowNull: true, defaultValue: null },
        archivedAt: optionalInstant,
        createdAt: instantColumn,
      },
      { sequelize, tableName: "loop", timestamps: false },
    );
  }

  get fluid(): NonAttribute<Fluid> {
    const { fluidKind, glycolPercent, glycolBasis } = this;
    if (fluidKind === "water") return { kind: "water" };
    if (glycolPercent === null || glycolBasis === null)
      throw new Error(`loop ${this.id} holds glycol but no percent or basis is stored`);
    return {
      kind: fluidKind,
      percent: glycolPercent,
      basis: glycolBasis,
      testedOn: this.glycolTestedOn,
      testMethod: this.glycolTestMethod,
    };
  }
}

/** A fluid as the columns that store it. */
export function fluidColumns(fluid: Fluid) {
  const glycol = fluid.kind === "water" ? null : fluid;
  return {
    fluidKind: fluid.kind,
    glycolPercent: glycol?.percent ?? null,
    glycolBasis: glycol?.basis ?? null,
    glycolTestedOn: glycol?.testedOn ?? null,
    glycolTestMethod: glycol?.testMethod ?? null,
  };
}
