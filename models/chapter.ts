import {
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from "sequelize";
import { moment, idColumn, reference, short, whole } from "./columns";

/** A chapter of a work. */
export class Chapter extends Model<InferAttributes<Chapter>, InferCreationAttributes<Chapter>> {
  declare id: CreationOptional<string>;
  declare workId: string;
  /** as printed; unique within the work */
  declare number: number;
  declare title: string;
  declare createdAt: CreationOptional<Date>;
  declare updatedAt: CreationOptional<Date>;
}

export function initChapter(sequelize: Sequelize) {
  return Chapter.init(
    {
      id: idColumn(),
      workId: reference(),
      number: whole(),
      title: short(200),
      createdAt: moment(),
      updatedAt: moment(),
    },
    { tableName: "chapters", sequelize },
  );
}
