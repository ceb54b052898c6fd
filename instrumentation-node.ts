import { durabilityFaults } from "@/lib/database-check";

declare global {
  /** Set when the process was asked to end; open event streams end on it instead of holding the server up. */
  var surdmarkStopping: boolean | undefined;
}

/** Reads the settings, looks at the database's, and prepares for the end. Exits with a sentence when something is wrong. */
export async function beforeFirstRequest(): Promise<void> {
  for (const signal of ["SIGTERM", "SIGINT"] as const)
    process.once(signal, () => {
      globalThis.surdmarkStopping = true;
    });
  const env = await import("@/lib/env").then(
    (module) => module.env,
    (error: unknown) => refuse(error instanceof Error ? error.message : String(error)),
  );
  if (env.NODE_ENV !== "production") return;
  const faults = await durabilityFaults(env.DATABASE_URL).catch((error: unknown) =>
    refuse(`MariaDB's settings could not be read: ${error instanceof Error ? error.message : String(error)}`),
  );
  if (faults.length > 0) refuse(faults.join("\n"));
}

function refuse(sentence: string): never {
  console.error(sentence);
  process.exit(1);
}
