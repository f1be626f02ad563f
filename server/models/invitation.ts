import {
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from "sequelize";
import { idColumn, instantColumn, reference, secretHashColumn } from "./columns";

/** The one open invitation of an invited member; a resend replaces it, acceptance removes it. */
export class Invitation extends Model<
  InferAttributes<Invitation>,
  InferCreationAttributes<Invitation>
> {
  declare id: CreationOptional<string>;
  declare organisationId: string;
  declare membershipId: string;
  declare secretHash: string;
  declare createdAt: Date;
  declare expiresAt: Date;

  static define(sequelize: Sequelize): void {
    Invitation.init(
      {
        id: idColumn,
        organisationId: reference,
        membershipId: reference,
        secretHash: secretHashColumn,
        createdAt: instantColumn,
        expiresAt: instantColumn,
      },
      { sequelize, tableName: "invitation", timestamps: false },
    );
  }
}
