import {
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from "sequelize";
import { moment, idColumn, json, reference, whole } from "./columns";

/** One version of the phase, ordering and normalisation choices of a work; never edited, only followed by the next version. */
export class ConventionsSheet extends Model<
  InferAttributes<ConventionsSheet>,
  InferCreationAttributes<ConventionsSheet>
> {
  declare id: CreationOptional<string>;
  declare workId: string;
  /** unique within the work */
  declare version: number;
  /** the Conventions object of lib/verify */
  declare choices: unknown;
  declare createdById: string;
  declare createdAt: CreationOptional<Date>;
}

export function initConventionsSheet(sequelize: Sequelize) {
  return ConventionsSheet.init(
    {
      id: idColumn(),
      workId: reference(),
      version: whole(),
      choices: json<unknown>("choices"),
      createdById: reference(),
      createdAt: moment(),
    },
    { tableName: "conventions_sheets", sequelize, updatedAt: false },
  );
}
