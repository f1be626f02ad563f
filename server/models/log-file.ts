import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type NonAttribute,
  type Sequelize,
} from "sequelize";
import type { AppliedRecipe } from "@shared/contracts/recipes";
import type { ContainerKind, UnpackNotes } from "@shared/domain/log-files/containers";
import type { FileRecipe } from "@shared/domain/log-files/recipe";
import type { Question, Recognition, Unreadable } from "@shared/domain/log-files/recognition";
import type { SeriesKind } from "@shared/domain/readings/reading-columns";
import { idColumn, instantColumn, reference } from "./columns";
import { optionalJson } from "./json-column";

/** What recognition found besides the recipe, which changes with the answers. */
export interface RecognitionFindings extends Omit<Recognition, "recipe" | "questions"> {
  /** Everything it asked; `questions` of the file are those that are still open. */
  readonly asked: readonly Question[];
  /** The recipe as it was proposed, before any answer; missing from files recognised long ago. */
  readonly proposed?: FileRecipe;
}

/**
 * The text of one log; its bytes are in the file store under their hash. Where it came inside a
 * workbook or an archive, the source is the upload, whose bytes are kept as well.
 */
export class LogFile extends Model<InferAttributes<LogFile>, InferCreationAttributes<LogFile>> {
  declare id: CreationOptional<string>;
  declare organisationId: string;
  declare importId: string;
  declare pointId: string;
  declare name: string;
  declare sha256: string;
  declare byteLength: number;
  declare uploadedAt: Date;
  /** Null where the upload was the text itself. */
  declare sourceKind: CreationOptional<ContainerKind | null>;
  declare sourceSha256: CreationOptional<string | null>;
  declare sourceName: CreationOptional<string | null>;
  declare sourceByteLength: CreationOptional<number | null>;
  /** The sheet or the path in the archive; null until it is unpacked. */
  declare member: CreationOptional<string | null>;
  declare unpackNotes: CreationOptional<UnpackNotes | null>;
  declare recognition: CreationOptional<RecognitionFindings | null>;
  declare unreadable: CreationOptional<Unreadable | null>;
  declare recipe: CreationOptional<FileRecipe | null>;
  declare questions: CreationOptional<readonly Question[] | null>;
  /** The saved recipe it is read by, with what was different; null where none was applied. */
  declare appliedRecipe: CreationOptional<AppliedRecipe | null>;
  /** Set while its readings are stored: where files hold the same instant the greater one wins. */
  declare precedence: CreationOptional<number | null>;
  declare seriesKind: CreationOptional<SeriesKind | null>;
  declare nominalStepMs: CreationOptional<number | null>;

  static define(sequelize: Sequelize): void {
    LogFile.init(
      {
        id: idColumn,
        organisationId: reference,
        importId: reference,
        pointId: reference,
        name: { type: DataTypes.STRING(255), allowNull: false },
        sha256: { type: DataTypes.CHAR(64), allowNull: false },
        byteLength: {
          type: DataTypes.BIGINT.UNSIGNED,
          allowNull: false,
          // At most 200 MB: safely a number, though the connector gives every BIGINT as text.
          get(this: LogFile) {
            return Number(this.getDataValue("byteLength"));
          },
        },
        uploadedAt: instantColumn,
        sourceKind: { type: DataTypes.ENUM("xlsx", "zip", "gzip"), allowNull: true },
        sourceSha256: { type: DataTypes.CHAR(64), allowNull: true },
        sourceName: { type: DataTypes.STRING(255), allowNull: true },
        sourceByteLength: {
          type: DataTypes.BIGINT.UNSIGNED,
          allowNull: true,
          get(this: LogFile) {
            const length = this.getDataValue("sourceByteLength");
            return length == null ? null : Number(length);
          },
        },
        member: { type: DataTypes.STRING(255), allowNull: true },
        unpackNotes: optionalJson("unpackNotes"),
        recognition: optionalJson("recognition"),
        unreadable: optionalJson("unreadable"),
        recipe: optionalJson("recipe"),
        questions: optionalJson("questions"),
        appliedRecipe: optionalJson("appliedRecipe"),
        precedence: { type: DataTypes.INTEGER, allowNull: true },
        seriesKind: {
          type: DataTypes.ENUM("instantaneous", "meanFromLabel", "meanToLabel"),
          allowNull: true,
        },
        nominalStepMs: { type: DataTypes.DOUBLE, allowNull: true },
      },
      { sequelize, tableName: "log_file", timestamps: false },
    );
  }

  /** It came inside something that is still to be unpacked. */
  get isPacked(): NonAttribute<boolean> {
    return this.sourceKind !== null && this.sourceKind !== undefined && this.member === null;
  }
}
