import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from "sequelize";
import { moment, json, reference, short } from "./columns";

/** Who did what, with what was there before and after. Triggers refuse UPDATE and DELETE. */
export class AuditEvent extends Model<InferAttributes<AuditEvent>, InferCreationAttributes<AuditEvent>> {
  declare id: CreationOptional<number>;
  declare workId: CreationOptional<string | null>;
  declare actorId: CreationOptional<string | null>;
  /** such as flag.settle */
  declare action: string;
  declare subjectType: string;
  declare subjectId: string;
  declare before: unknown;
  declare after: unknown;
  declare createdAt: CreationOptional<Date>;
}

export function initAuditEvent(sequelize: Sequelize) {
  return AuditEvent.init(
    {
      id: { type: DataTypes.INTEGER.UNSIGNED, primaryKey: true, autoIncrement: true },
      workId: reference(true),
      actorId: reference(true),
      action: short(60),
      subjectType: short(40),
      subjectId: short(40),
      before: json<unknown>("before", true),
      after: json<unknown>("after", true),
      createdAt: moment(),
    },
    { tableName: "audit_events", sequelize, updatedAt: false },
  );
}
