import {
  DataTypes,
  Model,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from "sequelize";
import { instantColumn } from "./columns";

/**
 * Failed sign-ins counted by e-mail address, known or not, so that the limit tells nobody which
 * addresses have an account. The address itself is not kept.
 */
export class SignInFailure extends Model<
  InferAttributes<SignInFailure>,
  InferCreationAttributes<SignInFailure>
> {
  declare emailHash: string;
  declare failures: number;
  declare windowStartedAt: Date;

  static define(sequelize: Sequelize): void {
    SignInFailure.init(
      {
        emailHash: { type: DataTypes.CHAR(64), primaryKey: true },
        failures: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
        windowStartedAt: instantColumn,
      },
      { sequelize, tableName: "sign_in_failure", timestamps: false },
    );
  }
}
