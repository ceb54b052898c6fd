import {
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from "sequelize";
import { idColumn, json, moment, reference, short, text, whole } from "./columns";

export type Verdict =
  "confirmed" | "confirmed-not-house-form" | "discrepant" | "contradicted" | "unreadable" | "undecided";

/** What the verifier says of one claim in one run. Written empty when the run starts, filled in once. */
export class Finding extends Model<InferAttributes<Finding>, InferCreationAttributes<Finding>> {
  declare id: CreationOptional<string>;
  declare workId: string;
  declare chapterId: string;
  /** unique with claimId */
  declare runId: string;
  declare claimId: string;
  declare claimVersion: number;
  declare batch: number;
  /** how often a worker has begun this claim; a claim that fells its worker ends as undecided */
  declare attempts: CreationOptional<number>;
  /** null until judged */
  declare verdict: CreationOptional<Verdict | null>;
  declare exactText: CreationOptional<string | null>;
  declare exactLatex: CreationOptional<string | null>;
  declare exactDecimal: CreationOptional<string | null>;
  declare slips: unknown;
  declare reason: CreationOptional<string | null>;
  /** reading, errors, house form, vanishing reasons, canonical claim: the rest of lib/verify's Finding */
  declare details: unknown;
  declare evidence: unknown;
  declare orbitKey: CreationOptional<string | null>;
  declare judgedAt: CreationOptional<Date | null>;
  declare createdAt: CreationOptional<Date>;
}

export function initFinding(sequelize: Sequelize) {
  return Finding.init(
    {
      id: idColumn(),
      workId: reference(),
      chapterId: reference(),
      runId: reference(),
      claimId: reference(),
      claimVersion: whole(),
      batch: whole(),
      attempts: { ...whole(), defaultValue: 0 },
      verdict: short(30, true),
      exactText: text(true),
      exactLatex: text(true),
      exactDecimal: short(60, true),
      slips: json<unknown>("slips", true),
      reason: text(true),
      details: json<unknown>("details", true),
      evidence: json<unknown>("evidence", true),
      orbitKey: short(191, true),
      judgedAt: moment(true),
      createdAt: moment(),
    },
    { tableName: "findings", sequelize, updatedAt: false },
  );
}
