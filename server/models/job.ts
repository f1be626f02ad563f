import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from "sequelize";
import { idColumn, instantColumn, optionalInstant, optionalReference, reference } from "./columns";
import { optionalJson } from "./json-column";
import type { Failure } from "./log-import";

export const jobKinds = [
  "unpack",
  "recognise",
  "check",
  "import",
  "undo",
  "recalculate",
  "correction",
] as const;
export type JobKind = (typeof jobKinds)[number];

export interface JobProgress {
  readonly stage:
    "waiting" | "recognising" | "reading" | "checking" | "storing" | "energy" | "done";
  readonly rowsRead: number;
  readonly rowsTotal: number | null;
  readonly secondsLeft: number | null;
}

/** Slow work for a worker. Claimed with a lease, so that a server that dies loses nothing. */
export class Job extends Model<InferAttributes<Job>, InferCreationAttributes<Job>> {
  declare id: CreationOptional<string>;
  declare organisationId: string;
  declare kind: JobKind;
  declare state: "queued" | "running" | "done" | "failed" | "cancelled";
  declare pointId: string;
  declare importId: CreationOptional<string | null>;
  declare logFileId: CreationOptional<string | null>;
  declare correctionId: CreationOptional<string | null>;
  /** Revision of the import it was queued for. */
  declare revision: CreationOptional<number | null>;
  /** Unique while it waits, where a second one like it would do the same. */
  declare waitingKey: CreationOptional<string | null>;
  /** Times it ended in an error, and times its server died under it. */
  declare failures: CreationOptional<number>;
  declare interruptions: CreationOptional<number>;
  declare leaseOwner: CreationOptional<string | null>;
  declare leaseUntil: CreationOptional<Date | null>;
  declare runAfter: Date;
  declare progress: CreationOptional<JobProgress | null>;
  declare failure: CreationOptional<Failure | null>;
  declare createdAt: Date;
  declare startedAt: CreationOptional<Date | null>;
  declare finishedAt: CreationOptional<Date | null>;

  static define(sequelize: Sequelize): void {
    const count = { type: DataTypes.TINYINT.UNSIGNED, allowNull: false, defaultValue: 0 } as const;
    Job.init(
      {
        id: idColumn,
        organisationId: reference,
        kind: { type: DataTypes.ENUM(...jobKinds), allowNull: false },
        state: {
          type: DataTypes.ENUM("queued", "running", "done", "failed", "cancelled"),
          allowNull: false,
        },
        pointId: reference,
        importId: optionalReference,
        logFileId: optionalReference,
        correctionId: optionalReference,
        revision: { type: DataTypes.INTEGER.UNSIGNED, allowNull: true },
        waitingKey: { type: DataTypes.STRING(60), allowNull: true },
        failures: count,
        interruptions: count,
        leaseOwner: { type: DataTypes.STRING(160), allowNull: true },
        leaseUntil: optionalInstant,
        runAfter: instantColumn,
        progress: optionalJson("progress"),
        failure: optionalJson("failure"),
        createdAt: instantColumn,
        startedAt: optionalInstant,
        finishedAt: optionalInstant,
      },
      { sequelize, tableName: "job", timestamps: false },
    );
  }
}
