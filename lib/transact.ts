import type { Transaction } from "sequelize";
import { isDeadlock } from "@/lib/errors";
import { sequelize } from "@/models";

/**
 * Runs `work` in one transaction, again from the start when the database chose it as the victim of a deadlock
 * (at most 5 times). `work` must have no effect outside the database.
 */
export async function transact<T>(work: (transaction: Transaction) => Promise<T>): Promise<T> {
  for (let attempt = 1; ; attempt++) {
    try {
      return await sequelize.transaction(work);
    } catch (error) {
      if (attempt >= 5 || !isDeadlock(error)) throw error;
      await new Promise((resolve) => setTimeout(resolve, Math.random() * 40 * attempt));
    }
  }
}
