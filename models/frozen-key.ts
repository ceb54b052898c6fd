import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from "sequelize";
import { moment, idColumn, reference, short, whole } from "./columns";

/** An immutable, numbered snapshot. Triggers refuse UPDATE and DELETE. */
export class FrozenKey extends Model<InferAttributes<FrozenKey>, InferCreationAttributes<FrozenKey>> {
  declare id: CreationOptional<string>;
  declare workId: string;
  /** unique within the work */
  declare number: number;
  /** RFC 8785 */
  declare canonicalJson: string;
  /** of the canonical JSON */
  declare sha256: string;
  declare claims: number;
  declare frozenById: string;
  declare createdAt: CreationOptional<Date>;
}

export function initFrozenKey(sequelize: Sequelize) {
  return FrozenKey.init(
    {
      id: idColumn(),
      workId: reference(),
      number: whole(),
      canonicalJson: { type: DataTypes.TEXT("long"), allowNull: false },
      sha256: short(64),
      claims: whole(),
      frozenById: reference(),
      createdAt: moment(),
    },
    { tableName: "frozen_keys", sequelize, updatedAt: false },
  );
}
