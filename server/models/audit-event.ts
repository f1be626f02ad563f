import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from "sequelize";
import { idColumn, instantColumn, optionalReference } from "./columns";

/** Who did what, when. Append only: the model refuses to change or remove a row. */
export class AuditEvent extends Model<
  InferAttributes<AuditEvent>,
  InferCreationAttributes<AuditEvent>
> {
  declare id: CreationOptional<string>;
  declare organisationId: CreationOptional<string | null>;
  declare accountId: CreationOptional<string | null>;
  /** Kept beside the account's id, so the record still reads after a change of name. */
  declare actorName: string;
  declare kind: string;
  declare subjectKind: CreationOptional<string | null>;
  declare subjectId: CreationOptional<string | null>;
  declare details: CreationOptional<Record<string, unknown> | null>;
  declare address: CreationOptional<string | null>;
  declare at: Date;

  static define(sequelize: Sequelize): void {
    AuditEvent.init(
      {
        id: idColumn,
        organisationId: optionalReference,
        accountId: optionalReference,
        actorName: { type: DataTypes.STRING(254), allowNull: false },
        kind: { type: DataTypes.STRING(60), allowNull: false },
        subjectKind: { type: DataTypes.STRING(40), allowNull: true },
        subjectId: { type: DataTypes.STRING(40), allowNull: true },
        details: { type: DataTypes.JSON, allowNull: true },
        address: { type: DataTypes.STRING(64), allowNull: true },
        at: instantColumn,
      },
      { sequelize, tableName: "audit_event", timestamps: false },
    );
    const refuse = (): never => {
      throw new Error("An audit event is never changed or removed: write another one.");
    };
    AuditEvent.beforeUpdate(refuse);
    AuditEvent.beforeDestroy(refuse);
    AuditEvent.beforeBulkUpdate(refuse);
    AuditEvent.beforeBulkDestroy(refuse);
  }
}
