import { log } from "@/lib/log";
import { startWorker } from "./worker";

process.env.SURDMARK_PROCESS ??= "worker";

// The last resort: nothing is left half-trusted. Whoever started this process starts it again, and leases run out.
for (const event of ["uncaughtException", "unhandledRejection"] as const)
  process.on(event, (error: unknown) => {
    log.fatal({ error }, "the worker met what it does not know and ends");
    process.exit(1);
  });

const worker = startWorker();
log.info("the worker is at work");

for (const signal of ["SIGTERM", "SIGINT"] as const)
  process.once(signal, () => {
    log.info("the worker is asked to end");
    worker.stop().then(
      () => process.exit(0),
      () => process.exit(0),
    );
  });
