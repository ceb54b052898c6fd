import {
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from "sequelize";
import { idColumn, moment, reference, short, text, whole } from "./columns";

import type { Verdict } from "./finding";

/** One answer part: a quantity and its claimed value, in its current version. */
export class Claim extends Model<InferAttributes<Claim>, InferCreationAttributes<Claim>> {
  declare id: CreationOptional<string>;
  declare workId: string;
  declare chapterId: string;
  declare problemId: string;
  /** such as 7.3(a); unique within the work */
  declare ref: string;
  declare position: number;
  /** number of the current ClaimVersion */
  declare current: CreationOptional<number>;
  /** as typed, of the current version */
  declare quantity: string;
  /** as typed, of the current version */
  declare claimed: string;
  declare note: CreationOptional<string | null>;
  declare page: CreationOptional<string | null>;
  /** who wrote the current version */
  declare claimantId: string;
  /** canonical key of the quantity under its symmetries; null when unreadable */
  declare orbitKey: CreationOptional<string | null>;
  /** of the last finding on the current version; null while unchecked */
  declare verdict: CreationOptional<Verdict | null>;
  /** the finding that gave the verdict */
  declare findingId: CreationOptional<string | null>;
  declare withdrawnAt: CreationOptional<Date | null>;
  /** optimistic lock */
  declare version: CreationOptional<number>;
  declare createdAt: CreationOptional<Date>;
  declare updatedAt: CreationOptional<Date>;
}

export function initClaim(sequelize: Sequelize) {
  return Claim.init(
    {
      id: idColumn(),
      workId: reference(),
      chapterId: reference(),
      problemId: reference(),
      ref: short(60),
      position: whole(),
      current: { ...whole(), defaultValue: 1 },
      quantity: text(),
      claimed: text(),
      note: short(500, true),
      page: short(20, true),
      claimantId: reference(),
      orbitKey: short(191, true),
      verdict: short(30, true),
      findingId: reference(true),
      withdrawnAt: moment(true),
      version: { ...whole(), defaultValue: 0 },
      createdAt: moment(),
      updatedAt: moment(),
    },
    { tableName: "claims", sequelize, version: true },
  );
}
