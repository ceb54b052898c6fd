import {
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from "sequelize";
import { idColumn, moment, reference, short, whole } from "./columns";

export type RunState = "queued" | "running" | "ended" | "cancelled";

/** One verification of a chapter or of a whole work. */
export class Run extends Model<InferAttributes<Run>, InferCreationAttributes<Run>> {
  declare id: CreationOptional<string>;
  declare workId: string;
  /** null: the whole work */
  declare chapterId: CreationOptional<string | null>;
  declare startedById: string;
  declare state: CreationOptional<RunState>;
  declare conventionsVersion: number;
  /** version of the program */
  declare engine: string;
  /** findings to make */
  declare total: number;
  declare batches: number;
  declare startedAt: CreationOptional<Date | null>;
  declare endedAt: CreationOptional<Date | null>;
  declare createdAt: CreationOptional<Date>;
}

export function initRun(sequelize: Sequelize) {
  return Run.init(
    {
      id: idColumn(),
      workId: reference(),
      chapterId: reference(true),
      startedById: reference(),
      state: { ...short(20), defaultValue: "queued" },
      conventionsVersion: whole(),
      engine: short(40),
      total: whole(),
      batches: whole(),
      startedAt: moment(true),
      endedAt: moment(true),
      createdAt: moment(),
    },
    { tableName: "runs", sequelize, updatedAt: false },
  );
}
