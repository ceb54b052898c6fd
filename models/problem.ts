import {
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from "sequelize";
import { moment, idColumn, reference, short, text, whole } from "./columns";

/** A problem: its label as printed and its statement in LaTeX. */
export class Problem extends Model<InferAttributes<Problem>, InferCreationAttributes<Problem>> {
  declare id: CreationOptional<string>;
  declare workId: string;
  declare chapterId: string;
  /** such as 7.12; unique within the chapter */
  declare label: string;
  declare statement: string;
  declare position: number;
  /** optimistic lock */
  declare version: CreationOptional<number>;
  declare createdAt: CreationOptional<Date>;
  declare updatedAt: CreationOptional<Date>;
}

export function initProblem(sequelize: Sequelize) {
  return Problem.init(
    {
      id: idColumn(),
      workId: reference(),
      chapterId: reference(),
      label: short(40),
      statement: text(),
      position: whole(),
      version: { ...whole(), defaultValue: 0 },
      createdAt: moment(),
      updatedAt: moment(),
    },
    { tableName: "problems", sequelize, version: true },
  );
}
