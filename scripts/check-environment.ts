/** Says in one line each which settings are missing or wrong, and exits with 1 when any is. */
try {
  await import("@/lib/env");
} catch (error) {
  if (!(error instanceof Error) || error.name !== "BadEnvironment") throw error;
  console.error(error.message);
  process.exit(1);
}
export {};
