import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type NonAttribute,
  type Sequelize,
} from "sequelize";
import {
  correctionChange,
  type CorrectionChange,
  type CorrectionEffect,
} from "@shared/contracts/corrections";
import { idColumn, instantColumn, optionalInstant, optionalReference, reference } from "./columns";
import { jsonColumn, optionalJson } from "./json-column";
import type { Failure } from "./log-import";

export const correctionStates = ["working", "proposed", "applied", "withdrawn", "failed"] as const;

const optionalName = { type: DataTypes.STRING(120), allowNull: true, defaultValue: null } as const;

/** A change of how readings are read, never of the readings. Withdrawn ones stay in the list. */
export class Correction extends Model<
  InferAttributes<Correction>,
  InferCreationAttributes<Correction>
> {
  declare id: CreationOptional<string>;
  declare organisationId: string;
  /** Where somebody proposed it; the point it changes, unless it is a probe's. */
  declare proposedAtPointId: string;
  /** Null for a probe's offset: installations say which points it touches. */
  declare pointId: CreationOptional<string | null>;
  declare probeId: CreationOptional<string | null>;
  declare logFileId: CreationOptional<string | null>;
  /** The import whose checks it was chosen in; null for one that somebody proposed. */
  declare importId: CreationOptional<string | null>;
  declare kind: CorrectionChange["kind"];
  /** Read it through `change`, which checks it. */
  declare document: CorrectionChange;
  declare reason: string;
  declare state: (typeof correctionStates)[number];
  declare effect: CreationOptional<CorrectionEffect | null>;
  declare failure: CreationOptional<Failure | null>;
  declare createdAt: Date;
  declare createdByAccountId: CreationOptional<string | null>;
  declare createdByName: string;
  declare appliedAt: CreationOptional<Date | null>;
  declare appliedByName: CreationOptional<string | null>;
  declare withdrawnAt: CreationOptional<Date | null>;
  declare withdrawnByName: CreationOptional<string | null>;
  declare withdrawnReason: CreationOptional<string | null>;

  static define(sequelize: Sequelize): void {
    Correction.init(
      {
        id: idColumn,
        organisationId: reference,
        proposedAtPointId: reference,
        pointId: optionalReference,
        probeId: optionalReference,
        logFileId: optionalReference,
        importId: optionalReference,
        kind: {
          type: DataTypes.ENUM(...correctionChange.options.map(({ shape }) => shape.kind.value)),
          allowNull: false,
        },
        document: jsonColumn("document"),
        reason: { type: DataTypes.STRING(300), allowNull: false },
        state: { type: DataTypes.ENUM(...correctionStates), allowNull: false },
        effect: optionalJson("effect"),
        failure: optionalJson("failure"),
        createdAt: instantColumn,
        createdByAccountId: optionalReference,
        createdByName: { type: DataTypes.STRING(120), allowNull: false },
        appliedAt: optionalInstant,
        appliedByName: optionalName,
        withdrawnAt: optionalInstant,
        withdrawnByName: optionalName,
        withdrawnReason: { type: DataTypes.STRING(300), allowNull: true, defaultValue: null },
      },
      { sequelize, tableName: "correction", timestamps: false },
    );
  }

  /** @throws ZodError where the stored document is not what the contract says. */
  get change(): NonAttribute<CorrectionChange> {
    return correctionChange.parse(this.document);
  }
}
