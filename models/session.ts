import {
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from "sequelize";
import { idColumn, moment, reference, short } from "./columns";

/** A sign-in that the server can end at once: its row is read on every request. */
export class Session extends Model<InferAttributes<Session>, InferCreationAttributes<Session>> {
  declare id: CreationOptional<string>;
  declare userId: string;
  /** SHA-256 of the random token inside the signed cookie; unique */
  declare tokenHash: string;
  declare userAgent: CreationOptional<string | null>;
  declare lastUsedAt: Date;
  declare expiresAt: Date;
  declare revokedAt: CreationOptional<Date | null>;
  declare createdAt: CreationOptional<Date>;
}

export function initSession(sequelize: Sequelize) {
  return Session.init(
    {
      id: idColumn(),
      userId: reference(),
      tokenHash: short(64),
      userAgent: short(255, true),
      lastUsedAt: moment(),
      expiresAt: moment(),
      revokedAt: moment(true),
      createdAt: moment(),
    },
    { tableName: "sessions", sequelize, updatedAt: false },
  );
}
