import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from "sequelize";
import { idColumn, moment, reference, short, whole } from "./columns";

export type SourceFormat = "csv" | "json" | "unknown";
export type SourceState = "received" | "accepted" | "set-aside";

/** An uploaded key file, kept byte for byte. */
export class Source extends Model<InferAttributes<Source>, InferCreationAttributes<Source>> {
  declare id: CreationOptional<string>;
  declare workId: string;
  declare chapterId: string;
  /** as the author named it; shown, never used as a path */
  declare name: string;
  declare format: SourceFormat;
  declare bytes: Buffer;
  declare size: number;
  declare sha256: string;
  declare uploadedById: string;
  declare state: CreationOptional<SourceState>;
  declare acceptedRows: CreationOptional<number | null>;
  declare acceptedAt: CreationOptional<Date | null>;
  declare acceptedById: CreationOptional<string | null>;
  declare createdAt: CreationOptional<Date>;
}

export function initSource(sequelize: Sequelize) {
  return Source.init(
    {
      id: idColumn(),
      workId: reference(),
      chapterId: reference(),
      name: short(255),
      format: short(10),
      bytes: { type: DataTypes.BLOB("long"), allowNull: false },
      size: whole(),
      sha256: short(64),
      uploadedById: reference(),
      state: { ...short(20), defaultValue: "received" },
      acceptedRows: whole(true),
      acceptedAt: moment(true),
      acceptedById: reference(true),
      createdAt: moment(),
    },
    { tableName: "sources", sequelize, updatedAt: false },
  );
}
