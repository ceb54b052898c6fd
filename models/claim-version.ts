import {
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from "sequelize";
import { moment, idColumn, reference, short, text, whole } from "./columns";

/** How a version came to be: typed in the form, accepted from a source, or by settling a flag. */
export type ClaimOrigin = "typed" | "source" | "corrected" | "undone" | "restored";

/** What was claimed at one time; never changed. */
export class ClaimVersion extends Model<
  InferAttributes<ClaimVersion>,
  InferCreationAttributes<ClaimVersion>
> {
  declare id: CreationOptional<string>;
  declare workId: string;
  declare claimId: string;
  /** unique within the claim */
  declare number: number;
  declare quantity: string;
  declare claimed: string;
  declare note: CreationOptional<string | null>;
  declare page: CreationOptional<string | null>;
  declare authorId: string;
  declare origin: ClaimOrigin;
  /** the file it came from */
  declare sourceId: CreationOptional<string | null>;
  declare createdAt: CreationOptional<Date>;
}

export function initClaimVersion(sequelize: Sequelize) {
  return ClaimVersion.init(
    {
      id: idColumn(),
      workId: reference(),
      claimId: reference(),
      number: whole(),
      quantity: text(),
      claimed: text(),
      note: short(500, true),
      page: short(20, true),
      authorId: reference(),
      origin: short(20),
      sourceId: reference(true),
      createdAt: moment(),
    },
    { tableName: "claim_versions", sequelize, updatedAt: false },
  );
}
