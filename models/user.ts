import {
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from "sequelize";
import { flagColumn, idColumn, moment, short } from "./columns";

/** A person with an account. */
export class User extends Model<InferAttributes<User>, InferCreationAttributes<User>> {
  declare id: CreationOptional<string>;
  /** lower case; unique */
  declare email: string;
  /** as printed */
  declare name: string;
  /** argon2id; null until the invitation is accepted */
  declare passwordHash: CreationOptional<string | null>;
  /** site administrator: accounts, mail, queues, audit; no reading of works */
  declare isAdmin: CreationOptional<boolean>;
  declare disabledAt: CreationOptional<Date | null>;
  declare createdAt: CreationOptional<Date>;
  declare updatedAt: CreationOptional<Date>;
}

export function initUser(sequelize: Sequelize) {
  return User.init(
    {
      id: idColumn(),
      email: short(254),
      name: short(120),
      passwordHash: short(255, true),
      isAdmin: flagColumn(),
      disabledAt: moment(true),
      createdAt: moment(),
      updatedAt: moment(),
    },
    { tableName: "users", sequelize },
  );
}
