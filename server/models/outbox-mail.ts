import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from "sequelize";
import { idColumn, instantColumn, optionalInstant, optionalReference } from "./columns";

/**
 * A letter to send. Written in the transaction of what caused it, so neither exists without the
 * other. The body is dropped once sent or given up, because links in it are secrets.
 */
export class OutboxMail extends Model<
  InferAttributes<OutboxMail>,
  InferCreationAttributes<OutboxMail>
> {
  declare id: CreationOptional<string>;
  declare organisationId: CreationOptional<string | null>;
  declare kind: string;
  declare toAddress: string;
  declare subject: string;
  declare bodyText: string | null;
  declare bodyHtml: string | null;
  declare state: "queued" | "sending" | "sent" | "failed";
  declare attempts: CreationOptional<number>;
  declare nextAttemptAt: Date;
  declare lastError: CreationOptional<string | null>;
  declare createdAt: Date;
  declare sentAt: CreationOptional<Date | null>;

  static define(sequelize: Sequelize): void {
    OutboxMail.init(
      {
        id: idColumn,
        organisationId: optionalReference,
        kind: { type: DataTypes.STRING(40), allowNull: false },
        toAddress: { type: DataTypes.STRING(254), allowNull: false },
        subject: { type: DataTypes.STRING(200), allowNull: false },
        bodyText: { type: DataTypes.TEXT, allowNull: true },
        bodyHtml: { type: DataTypes.TEXT, allowNull: true },
        state: { type: DataTypes.ENUM("queued", "sending", "sent", "failed"), allowNull: false },
        attempts: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false, defaultValue: 0 },
        nextAttemptAt: instantColumn,
        lastError: { type: DataTypes.STRING(500), allowNull: true },
        createdAt: instantColumn,
        sentAt: optionalInstant,
      },
      { sequelize, tableName: "outbox_mail", timestamps: false },
    );
  }
}
