import {
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from "sequelize";
import { idColumn, moment, reference, short, whole } from "./columns";

export type FlagState = "open" | "settled" | "superseded";

/** A finding that needs a second author. */
export class Flag extends Model<InferAttributes<Flag>, InferCreationAttributes<Flag>> {
  declare id: CreationOptional<string>;
  declare workId: string;
  declare chapterId: string;
  declare claimId: string;
  declare claimVersion: number;
  declare findingId: string;
  declare runId: string;
  declare claimantId: string;
  declare state: CreationOptional<FlagState>;
  /** the claim while open, else null; unique: one open flag per claim */
  declare openClaimId: CreationOptional<string | null>;
  declare assigneeId: CreationOptional<string | null>;
  /** when the assignee's digest named it */
  declare toldAt: CreationOptional<Date | null>;
  /** optimistic lock */
  declare version: CreationOptional<number>;
  declare createdAt: CreationOptional<Date>;
  declare updatedAt: CreationOptional<Date>;
}

export function initFlag(sequelize: Sequelize) {
  return Flag.init(
    {
      id: idColumn(),
      workId: reference(),
      chapterId: reference(),
      claimId: reference(),
      claimVersion: whole(),
      findingId: reference(),
      runId: reference(),
      claimantId: reference(),
      state: { ...short(20), defaultValue: "open" },
      openClaimId: reference(true),
      assigneeId: reference(true),
      toldAt: moment(true),
      version: { ...whole(), defaultValue: 0 },
      createdAt: moment(),
      updatedAt: moment(),
    },
    { tableName: "flags", sequelize, version: true },
  );
}
