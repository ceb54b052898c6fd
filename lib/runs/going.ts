import type { RunState } from "@/models/run";

/** States of a run that still has findings to make. */
export const GOING: readonly RunState[] = ["queued", "running"];
export const isGoing = (state: RunState) => GOING.includes(state);

/** Keys of a run's outbox rows: with them a run that has lost its rows can be told from one that waits. */
export const runKeys = (runId: string) => `run ${runId} `;
export const batchKey = (runId: string, batch: number) => `${runKeys(runId)}batch ${batch}`;
export const finishKey = (runId: string) => `${runKeys(runId)}finish`;

/** Claims of one batch: small enough that a killed worker costs little, large enough that a ring pays. */
export const BATCH_SIZE = 50;
/** Claims of one run. */
export const LARGEST_RUN = 100_000;
