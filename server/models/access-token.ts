import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from "sequelize";
import { idColumn, instantColumn, optionalInstant, reference, secretHashColumn } from "./columns";

/** A bearer token for a script. It acts as the member who made it; only its hash is kept. */
export class AccessToken extends Model<
  InferAttributes<AccessToken>,
  InferCreationAttributes<AccessToken>
> {
  declare id: CreationOptional<string>;
  declare organisationId: string;
  declare membershipId: string;
  declare name: string;
  declare secretHash: string;
  declare createdAt: Date;
  declare expiresAt: CreationOptional<Date | null>;
  declare lastUsedAt: CreationOptional<Date | null>;
  declare revokedAt: CreationOptional<Date | null>;

  static define(sequelize: Sequelize): void {
    AccessToken.init(
      {
        id: idColumn,
        organisationId: reference,
        membershipId: reference,
        name: { type: DataTypes.STRING(120), allowNull: false },
        secretHash: secretHashColumn,
        createdAt: instantColumn,
        expiresAt: optionalInstant,
        lastUsedAt: optionalInstant,
        revokedAt: optionalInstant,
      },
      { sequelize, tableName: "access_token", timestamps: false },
    );
  }
}
