import { randomUUID } from "node:crypto";
import { DataTypes } from "sequelize";

/** Column shapes that several tables share. Functions, because Sequelize writes into the objects it is given. */
export const idColumn = () => ({ type: DataTypes.UUID, primaryKey: true, defaultValue: () => randomUUID() });
export const reference = (allowNull = false) => ({ type: DataTypes.UUID, allowNull });
export const moment = (allowNull = false) => ({ type: DataTypes.DATE(3), allowNull });
export const text = (allowNull = false) => ({ type: DataTypes.TEXT, allowNull });
export const short = (length: number, allowNull = false) => ({ type: DataTypes.STRING(length), allowNull });
export const whole = (allowNull = false) => ({ type: DataTypes.INTEGER, allowNull });
export const flagColumn = () => ({ type: DataTypes.BOOLEAN, allowNull: false, defaultValue: false });

/** A list or an object kept as JSON text: exact strings inside stay exactly what they were. */
export const json = <T>(name: string, allowNull = false) => ({
  type: DataTypes.TEXT("long"),
  allowNull,
  get(this: { getDataValue(key: string): unknown }): T | null {
    const stored = this.getDataValue(name);
    return typeof stored === "string" ? (JSON.parse(stored) as T) : null;
  },
  set(this: { setDataValue(key: string, value: unknown): void }, value: T | null) {
    this.setDataValue(name, value === null || value === undefined ? null : JSON.stringify(value));
  },
});
