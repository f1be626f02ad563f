import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from "sequelize";
import { instantColumn, optionalInstant, reference } from "./columns";

/** One signed-in browser or script. The cookie only names this row, so ending it is immediate. */
export class Session extends Model<InferAttributes<Session>, InferCreationAttributes<Session>> {
  declare id: string;
  declare membershipId: string;
  declare accountId: string;
  declare organisationId: string;
  declare userAgent: CreationOptional<string | null>;
  declare createdAt: Date;
  declare lastSeenAt: Date;
  declare expiresAt: Date;
  declare revokedAt: CreationOptional<Date | null>;

  static define(sequelize: Sequelize): void {
    Session.init(
      {
        id: { type: DataTypes.CHAR(32), primaryKey: true },
        membershipId: reference,
        accountId: reference,
        organisationId: reference,
        userAgent: { type: DataTypes.STRING(200), allowNull: true },
        createdAt: instantColumn,
        lastSeenAt: instantColumn,
        expiresAt: instantColumn,
        revokedAt: optionalInstant,
      },
      { sequelize, tableName: "session", timestamps: false },
    );
  }
}
