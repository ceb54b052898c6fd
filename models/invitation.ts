import {
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from "sequelize";
import { idColumn, json, moment, reference, short } from "./columns";

export type InvitationRole = "lead" | "author" | "referee" | "production" | "person" | "administrator";

/** A single-use link by which somebody joins a work, or the site when workId is null. */
export class Invitation extends Model<InferAttributes<Invitation>, InferCreationAttributes<Invitation>> {
  declare id: CreationOptional<string>;
  declare workId: CreationOptional<string | null>;
  declare email: string;
  declare role: InvitationRole;
  declare chapterIds: CreationOptional<string[] | null>;
  /** SHA-256 of the token in the link; unique */
  declare tokenHash: string;
  /** null for the first administrator's link */
  declare invitedById: CreationOptional<string | null>;
  declare expiresAt: Date;
  declare acceptedAt: CreationOptional<Date | null>;
  declare acceptedById: CreationOptional<string | null>;
  declare withdrawnAt: CreationOptional<Date | null>;
  declare createdAt: CreationOptional<Date>;
}

export function initInvitation(sequelize: Sequelize) {
  return Invitation.init(
    {
      id: idColumn(),
      workId: reference(true),
      email: short(254),
      role: short(20),
      chapterIds: json<string[]>("chapterIds", true),
      tokenHash: short(64),
      invitedById: reference(true),
      expiresAt: moment(),
      acceptedAt: moment(true),
      acceptedById: reference(true),
      withdrawnAt: moment(true),
      createdAt: moment(),
    },
    { tableName: "invitations", sequelize, updatedAt: false },
  );
}
