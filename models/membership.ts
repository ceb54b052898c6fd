import {
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from "sequelize";
import { moment, idColumn, json, reference, short } from "./columns";

export type Role = "lead" | "author" | "referee" | "production";

/** A person's role on one work. */
export class Membership extends Model<InferAttributes<Membership>, InferCreationAttributes<Membership>> {
  declare id: CreationOptional<string>;
  /** unique with userId */
  declare workId: string;
  declare userId: string;
  declare role: Role;
  /** for a referee: the chapters they may read; null means all */
  declare chapterIds: CreationOptional<string[] | null>;
  declare createdAt: CreationOptional<Date>;
  declare updatedAt: CreationOptional<Date>;
}

export function initMembership(sequelize: Sequelize) {
  return Membership.init(
    {
      id: idColumn(),
      workId: reference(),
      userId: reference(),
      role: short(20),
      chapterIds: json<string[]>("chapterIds", true),
      createdAt: moment(),
      updatedAt: moment(),
    },
    { tableName: "memberships", sequelize },
  );
}
