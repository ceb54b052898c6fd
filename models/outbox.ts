import {
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from "sequelize";
import { idColumn, json, moment, short, text, whole } from "./columns";

export type OutboxKind = "run-batch" | "run-finish" | "mail" | "flag-digest";
export type OutboxState = "pending" | "done" | "dead";

/** Work that must happen after a commit. The database is the truth; the queue only rings. */
export class Outbox extends Model<InferAttributes<Outbox>, InferCreationAttributes<Outbox>> {
  declare id: CreationOptional<string>;
  declare kind: OutboxKind;
  declare payload: unknown;
  /** unique while pending */
  declare dedupeKey: CreationOptional<string | null>;
  declare state: CreationOptional<OutboxState>;
  declare dueAt: Date;
  declare attempts: CreationOptional<number>;
  declare leasedUntil: CreationOptional<Date | null>;
  declare lastError: CreationOptional<string | null>;
  declare doneAt: CreationOptional<Date | null>;
  declare createdAt: CreationOptional<Date>;
}

export function initOutbox(sequelize: Sequelize) {
  return Outbox.init(
    {
      id: idColumn(),
      kind: short(30),
      payload: json<unknown>("payload"),
      dedupeKey: short(191, true),
      state: { ...short(20), defaultValue: "pending" },
      dueAt: moment(),
      attempts: { ...whole(), defaultValue: 0 },
      leasedUntil: moment(true),
      lastError: text(true),
      doneAt: moment(true),
      createdAt: moment(),
    },
    { tableName: "outbox", sequelize, updatedAt: false },
  );
}
