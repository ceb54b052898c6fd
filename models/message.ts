import {
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from "sequelize";
import { moment, idColumn, reference, text } from "./columns";

/** A message in the discussion of a flag. */
export class Message extends Model<InferAttributes<Message>, InferCreationAttributes<Message>> {
  declare id: CreationOptional<string>;
  declare workId: string;
  declare flagId: string;
  declare authorId: string;
  declare body: string;
  declare createdAt: CreationOptional<Date>;
}

export function initMessage(sequelize: Sequelize) {
  return Message.init(
    {
      id: idColumn(),
      workId: reference(),
      flagId: reference(),
      authorId: reference(),
      body: text(),
      createdAt: moment(),
    },
    { tableName: "messages", sequelize, updatedAt: false },
  );
}
