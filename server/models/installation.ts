import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type NonAttribute,
  type Sequelize,
} from "sequelize";
import { installationDocument, type InstallationDocument } from "@shared/contracts/evidence";
import { idColumn, instantColumn, optionalInstant, optionalReference, reference } from "./columns";
import { jsonColumn } from "./json-column";

const reason = { type: DataTypes.STRING(300), allowNull: true, defaultValue: null } as const;

/**
 * How a point was measured from `startsAt` on: one version of the record. It stands while neither
 * `supersededAt` nor `withdrawnAt` is set; a correction is another row that names the one before.
 */
export class Installation extends Model<
  InferAttributes<Installation>,
  InferCreationAttributes<Installation>
> {
  declare id: CreationOptional<string>;
  declare organisationId: string;
  declare pointId: string;
  declare startsAt: Date;
  /** Null: until the next one starts. */
  declare endsAt: CreationOptional<Date | null>;
  declare flowMeterId: CreationOptional<string | null>;
  declare loggerId: CreationOptional<string | null>;
  declare supplyProbeId: CreationOptional<string | null>;
  declare returnProbeId: CreationOptional<string | null>;
  declare bathCheckId: CreationOptional<string | null>;
  /** Read it through `details`, which checks it. */
  declare document: InstallationDocument;
  declare version: number;
  declare supersedesId: CreationOptional<string | null>;
  declare supersededAt: CreationOptional<Date | null>;
  declare reason: CreationOptional<string | null>;
  declare withdrawnAt: CreationOptional<Date | null>;
  declare withdrawnByName: CreationOptional<string | null>;
  declare withdrawnReason: CreationOptional<string | null>;
  declare recordedAt: Date;
  declare recordedByAccountId: CreationOptional<string | null>;
  /** Kept as text: the record outlives the account. */
  declare recordedByName: string;

  static define(sequelize: Sequelize): void {
    Installation.init(
      {
        id: idColumn,
        organisationId: reference,
        pointId: reference,
        startsAt: instantColumn,
        endsAt: optionalInstant,
        flowMeterId: optionalReference,
        loggerId: optionalReference,
        supplyProbeId: optionalReference,
        returnProbeId: optionalReference,
        bathCheckId: optionalReference,
        document: jsonColumn("document"),
        version: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
        supersedesId: optionalReference,
        supersededAt: optionalInstant,
        reason,
        withdrawnAt: optionalInstant,
        withdrawnByName: { type: DataTypes.STRING(120), allowNull: true, defaultValue: null },
        withdrawnReason: reason,
        recordedAt: instantColumn,
        recordedByAccountId: optionalReference,
        recordedByName: { type: DataTypes.STRING(120), allowNull: false },
      },
      { sequelize, tableName: "installation", timestamps: false },
    );
  }

  /** @throws ZodError where the stored document is not what the contract says. */
  get details(): NonAttribute<InstallationDocument> {
    return installationDocument.parse(this.document);
  }

  get stands(): NonAttribute<boolean> {
    return this.supersededAt === null && this.withdrawnAt === null;
  }
}
