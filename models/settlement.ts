import {
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from "sequelize";
import { idColumn, json, moment, reference, short, text, whole } from "./columns";

export type SettleWord = "correct" | "stet" | "reword" | "withdraw";
export type ClaimBefore = { quantity: string; claimed: string; withdrawn: boolean };

/** How a flag was settled, by whom. claimantId is the flag's (a composite foreign key says so) and differs from settlerId (a check says so). */
export class Settlement extends Model<InferAttributes<Settlement>, InferCreationAttributes<Settlement>> {
  declare id: CreationOptional<string>;
  declare workId: string;
  declare flagId: string;
  declare claimantId: string;
  declare settlerId: string;
  declare word: SettleWord;
  declare reason: CreationOptional<string | null>;
  /** the convention a stet relies on */
  declare convention: CreationOptional<string | null>;
  declare claimVersionBefore: number;
  declare claimVersionAfter: CreationOptional<number | null>;
  /** quantity, claimed, withdrawn: to undo it */
  declare claimBefore: ClaimBefore;
  /** the flag while in force, null once undone; unique */
  declare activeFlagId: CreationOptional<string | null>;
  declare undoneAt: CreationOptional<Date | null>;
  declare undoneById: CreationOptional<string | null>;
  declare createdAt: CreationOptional<Date>;
}

export function initSettlement(sequelize: Sequelize) {
  return Settlement.init(
    {
      id: idColumn(),
      workId: reference(),
      flagId: reference(),
      claimantId: reference(),
      settlerId: reference(),
      word: short(20),
      reason: text(true),
      convention: short(200, true),
      claimVersionBefore: whole(),
      claimVersionAfter: whole(true),
      claimBefore: json<ClaimBefore>("claimBefore"),
      activeFlagId: reference(true),
      undoneAt: moment(true),
      undoneById: reference(true),
      createdAt: moment(),
    },
    { tableName: "settlements", sequelize, updatedAt: false },
  );
}
