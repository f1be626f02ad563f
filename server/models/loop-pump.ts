import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type NonAttribute,
  type Sequelize,
} from "sequelize";
import type { PumpCurve } from "@shared/domain/analysis/pump-power";
import { idColumn, reference } from "./columns";

const optionalDouble = { type: DataTypes.DOUBLE, allowNull: true, defaultValue: null } as const;

/** What is known of the pump that moves a loop's water; one a loop at most. */
export class LoopPump extends Model<InferAttributes<LoopPump>, InferCreationAttributes<LoopPump>> {
  declare id: CreationOptional<string>;
  declare organisationId: string;
  declare loopId: string;
  /** Part of the head stays whatever the flow: lift, or a head that a control holds. */
  declare controlledHead: boolean;
  /** That part, m; null without it. */
  declare staticHeadM: CreationOptional<number | null>;
  /** These three are known together or not at all. */
  declare designHeadM: CreationOptional<number | null>;
  declare designFlowM3PerHour: CreationOptional<number | null>;
  declare efficiency: CreationOptional<number | null>;
  declare minimumFlowM3PerHour: CreationOptional<number | null>;
  /** DECIMAL as text, in the site's currency. */
  declare pricePerKwh: CreationOptional<string | null>;

  static define(sequelize: Sequelize): void {
    LoopPump.init(
      {
        id: idColumn,
        organisationId: reference,
        loopId: reference,
        controlledHead: { type: DataTypes.BOOLEAN, allowNull: false },
        staticHeadM: { ...optionalDouble, field: "static_head_m" },
        designHeadM: { ...optionalDouble, field: "design_head_m" },
        designFlowM3PerHour: { ...optionalDouble, field: "design_flow_m3_per_hour" },
        efficiency: optionalDouble,
        minimumFlowM3PerHour: { ...optionalDouble, field: "minimum_flow_m3_per_hour" },
        pricePerKwh: {
          type: DataTypes.DECIMAL(12, 6),
          allowNull: true,
          defaultValue: null,
          field: "price_per_kwh",
        },
      },
      { sequelize, tableName: "loop_pump", timestamps: false },
    );
  }

  /** Null until head, flow and efficiency at design are known. */
  get curve(): NonAttribute<PumpCurve | null> {
    const { designHeadM, designFlowM3PerHour, efficiency } = this;
    if (designHeadM === null || designFlowM3PerHour === null || efficiency === null) return null;
    const staticHeadM = this.controlledHead ? this.staticHeadM : 0;
    return staticHeadM === null
      ? null
      : { staticHeadM, designHeadM, designFlowM3PerHour, efficiency };
  }
}
