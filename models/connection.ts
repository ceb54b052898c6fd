import { Sequelize } from "sequelize";
import { env } from "@/lib/env";

/**
 * One pool for this process. Big numbers come back as strings: the driver would otherwise round them
 * without a word. Exact values are text in every table, never DECIMAL or DOUBLE.
 */
export function connect(): Sequelize {
  return new Sequelize(env.DATABASE_URL, {
    dialect: "mariadb",
    logging: false,
    timezone: "+00:00",
    pool: { max: 12, min: 0, acquire: 5_000, idle: 60_000 },
    dialectOptions: {
      supportBigNumbers: true,
      bigNumberStrings: true,
      connectTimeout: 4_500,
      charset: "utf8mb4",
    },
    define: { underscored: true, charset: "utf8mb4", collate: "utf8mb4_unicode_ci" },
  });
}
