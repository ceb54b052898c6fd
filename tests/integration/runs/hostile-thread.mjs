import { parentPort } from "node:worker_threads";

/** A thread whose claims do what a broken engine could do. */
parentPort.on("message", ({ tasks }) => {
  for (const { id, ref } of tasks) {
    if (ref === "hang") for (;;);
    if (ref === "die") process.exit(9);
    parentPort.postMessage({ kind: "failed", id, says: "" });
  }
});
parentPort.postMessage("ready");
