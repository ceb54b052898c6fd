import type { Sequelize } from "sequelize";
import { connect } from "./connection";
import { initUser } from "./user";
import { initSession } from "./session";
import { initWork } from "./work";
import { initConventionsSheet } from "./conventions-sheet";
import { initMembership } from "./membership";
import { initInvitation } from "./invitation";
import { initChapter } from "./chapter";
import { initProblem } from "./problem";
import { initClaim } from "./claim";
import { initClaimVersion } from "./claim-version";
import { initSource } from "./source";
import { initRun } from "./run";
import { initFinding } from "./finding";
import { initFlag } from "./flag";
import { initSettlement } from "./settlement";
import { initMessage } from "./message";
import { initWaiver } from "./waiver";
import { initFrozenKey } from "./frozen-key";
import { initAuditEvent } from "./audit-event";
import { initOutbox } from "./outbox";

/**
 * The connection and the models initialised on it. Kept on globalThis as one piece: Next gives pages and route
 * handlers separate copies of a module, and a second copy of a class would be one that was never initialised.
 */
function load() {
  const sequelize = connect();
  const models = {
    User: initUser(sequelize),
    Session: initSession(sequelize),
    Work: initWork(sequelize),
    ConventionsSheet: initConventionsSheet(sequelize),
    Membership: initMembership(sequelize),
    Invitation: initInvitation(sequelize),
    Chapter: initChapter(sequelize),
    Problem: initProblem(sequelize),
    Claim: initClaim(sequelize),
    ClaimVersion: initClaimVersion(sequelize),
    Source: initSource(sequelize),
    Run: initRun(sequelize),
    Finding: initFinding(sequelize),
    Flag: initFlag(sequelize),
    Settlement: initSettlement(sequelize),
    Message: initMessage(sequelize),
    Waiver: initWaiver(sequelize),
    FrozenKey: initFrozenKey(sequelize),
    AuditEvent: initAuditEvent(sequelize),
    Outbox: initOutbox(sequelize),
  };
  associate(models);
  return { sequelize, ...models };
}

type Models = Omit<ReturnType<typeof load>, "sequelize">;

/** Associations are only those that a query includes; the foreign keys themselves are in the migrations. */
function associate(m: Models) {
  m.Membership.belongsTo(m.User, { as: "user", foreignKey: "userId" });
  m.Membership.belongsTo(m.Work, { as: "work", foreignKey: "workId" });
  m.Session.belongsTo(m.User, { as: "user", foreignKey: "userId" });
  m.Claim.belongsTo(m.Problem, { as: "problem", foreignKey: "problemId" });
  m.Claim.belongsTo(m.Chapter, { as: "chapter", foreignKey: "chapterId" });
  m.Claim.belongsTo(m.User, { as: "claimant", foreignKey: "claimantId" });
  m.Claim.belongsTo(m.Finding, { as: "finding", foreignKey: "findingId", constraints: false });
  m.Finding.belongsTo(m.Claim, { as: "claim", foreignKey: "claimId" });
  m.Flag.belongsTo(m.Claim, { as: "claim", foreignKey: "claimId" });
  m.Flag.belongsTo(m.Chapter, { as: "chapter", foreignKey: "chapterId" });
  m.Flag.belongsTo(m.Finding, { as: "finding", foreignKey: "findingId" });
  m.Flag.belongsTo(m.User, { as: "claimant", foreignKey: "claimantId" });
  m.Flag.belongsTo(m.User, { as: "assignee", foreignKey: "assigneeId" });
  m.Flag.hasMany(m.Settlement, { as: "settlements", foreignKey: "flagId" });
  m.Settlement.belongsTo(m.User, { as: "settler", foreignKey: "settlerId" });
  m.Message.belongsTo(m.User, { as: "author", foreignKey: "authorId" });
  m.ClaimVersion.belongsTo(m.User, { as: "author", foreignKey: "authorId" });
  m.FrozenKey.belongsTo(m.User, { as: "frozenBy", foreignKey: "frozenById" });
}

const kept = globalThis as { surdmarkModels?: ReturnType<typeof load> };
const models = (kept.surdmarkModels ??= load());

export const sequelize: Sequelize = models.sequelize;
export const {
  User,
  Session,
  Work,
  ConventionsSheet,
  Membership,
  Invitation,
  Chapter,
  Problem,
  Claim,
  ClaimVersion,
  Source,
  Run,
  Finding,
  Flag,
  Settlement,
  Message,
  Waiver,
  FrozenKey,
  AuditEvent,
  Outbox,
} = models;

export type User = InstanceType<typeof models.User>;
export type Session = InstanceType<typeof models.Session>;
export type Work = InstanceType<typeof models.Work>;
export type ConventionsSheet = InstanceType<typeof models.ConventionsSheet>;
export type Membership = InstanceType<typeof models.Membership>;
export type Invitation = InstanceType<typeof models.Invitation>;
export type Chapter = InstanceType<typeof models.Chapter>;
export type Problem = InstanceType<typeof models.Problem>;
export type Claim = InstanceType<typeof models.Claim>;
export type ClaimVersion = InstanceType<typeof models.ClaimVersion>;
export type Source = InstanceType<typeof models.Source>;
export type Run = InstanceType<typeof models.Run>;
export type Finding = InstanceType<typeof models.Finding>;
export type Flag = InstanceType<typeof models.Flag>;
export type Settlement = InstanceType<typeof models.Settlement>;
export type Message = InstanceType<typeof models.Message>;
export type Waiver = InstanceType<typeof models.Waiver>;
export type FrozenKey = InstanceType<typeof models.FrozenKey>;
export type AuditEvent = InstanceType<typeof models.AuditEvent>;
export type Outbox = InstanceType<typeof models.Outbox>;
