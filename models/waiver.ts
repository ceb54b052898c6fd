import {
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from "sequelize";
import { moment, idColumn, reference, text, whole } from "./columns";

/** A named reason for freezing an undecided claim as it stands. */
export class Waiver extends Model<InferAttributes<Waiver>, InferCreationAttributes<Waiver>> {
  declare id: CreationOptional<string>;
  declare workId: string;
  declare claimId: string;
  /** unique with claimId */
  declare claimVersion: number;
  declare namedById: string;
  declare reason: string;
  declare createdAt: CreationOptional<Date>;
}

export function initWaiver(sequelize: Sequelize) {
  return Waiver.init(
    {
      id: idColumn(),
      workId: reference(),
      claimId: reference(),
      claimVersion: whole(),
      namedById: reference(),
      reason: text(),
      createdAt: moment(),
    },
    { tableName: "waivers", sequelize, updatedAt: false },
  );
}
