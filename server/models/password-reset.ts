import {
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from "sequelize";
import { idColumn, instantColumn, optionalInstant, reference, secretHashColumn } from "./columns";

/** A reset link that was sent: works once, for an hour. */
export class PasswordReset extends Model<
  InferAttributes<PasswordReset>,
  InferCreationAttributes<PasswordReset>
> {
  declare id: CreationOptional<string>;
  declare accountId: string;
  declare secretHash: string;
  declare createdAt: Date;
  declare expiresAt: Date;
  declare usedAt: CreationOptional<Date | null>;

  static define(sequelize: Sequelize): void {
    PasswordReset.init(
      {
        id: idColumn,
        accountId: reference,
        secretHash: secretHashColumn,
        createdAt: instantColumn,
        expiresAt: instantColumn,
        usedAt: optionalInstant,
      },
      { sequelize, tableName: "password_reset", timestamps: false },
    );
  }
}
