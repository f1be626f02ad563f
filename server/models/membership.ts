import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type NonAttribute,
  type Sequelize,
} from "sequelize";
import { role, type Role } from "@shared/contracts/people";
import { Account } from "./account";
import { Invitation } from "./invitation";
import { idColumn, instantColumn, optionalInstant, optionalReference, reference } from "./columns";

/**
 * A person's place in an organisation. An invited one has no account yet; a removed one stays as a
 * row, because imports and other work point at it.
 */
export class Membership extends Model<
  InferAttributes<Membership>,
  InferCreationAttributes<Membership>
> {
  declare id: CreationOptional<string>;
  declare organisationId: string;
  declare accountId: CreationOptional<string | null>;
  declare invitedEmail: CreationOptional<string | null>;
  declare role: Role;
  declare state: "invited" | "active" | "disabled" | "removed";
  declare invitedAt: CreationOptional<Date | null>;
  declare lastSeenAt: CreationOptional<Date | null>;
  declare createdAt: Date;
  declare account?: NonAttribute<Account | null>;
  declare invitation?: NonAttribute<Invitation | null>;

  static define(sequelize: Sequelize): void {
    Membership.init(
      {
        id: idColumn,
        organisationId: reference,
        accountId: optionalReference,
        invitedEmail: { type: DataTypes.STRING(254), allowNull: true },
        role: { type: DataTypes.ENUM(...role.options), allowNull: false },
        state: {
          type: DataTypes.ENUM("invited", "active", "disabled", "removed"),
          allowNull: false,
        },
        invitedAt: optionalInstant,
        lastSeenAt: optionalInstant,
        createdAt: instantColumn,
      },
      { sequelize, tableName: "membership", timestamps: false },
    );
  }

  static associate(): void {
    Membership.belongsTo(Account, { as: "account", foreignKey: "accountId" });
    Membership.hasOne(Invitation, { as: "invitation", foreignKey: "membershipId" });
  }
}
