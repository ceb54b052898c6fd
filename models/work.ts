import {
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from "sequelize";
import { flagColumn, idColumn, moment, reference, short, whole } from "./columns";

export type WorkKind = "book" | "exam" | "course-pack";

/** A book, exam paper or course pack. */
export class Work extends Model<InferAttributes<Work>, InferCreationAttributes<Work>> {
  declare id: CreationOptional<string>;
  declare title: string;
  declare kind: WorkKind;
  /** an exam, or any work whose key must not be seen before its hour */
  declare confidential: CreationOptional<boolean>;
  /** the version of the conventions sheet in force */
  declare conventionsVersion: CreationOptional<number>;
  declare createdById: string;
  declare archivedAt: CreationOptional<Date | null>;
  declare createdAt: CreationOptional<Date>;
  declare updatedAt: CreationOptional<Date>;
}

export function initWork(sequelize: Sequelize) {
  return Work.init(
    {
      id: idColumn(),
      title: short(200),
      kind: short(20),
      confidential: flagColumn(),
      conventionsVersion: { ...whole(), defaultValue: 1 },
      createdById: reference(),
      archivedAt: moment(true),
      createdAt: moment(),
      updatedAt: moment(),
    },
    { tableName: "works", sequelize },
  );
}
