// A thread starts without the loader of its parent: this reads TypeScript for it, then begins the work.
import { register } from "tsx/esm/api";

register();
await import(process.argv[2] ?? "./verify-thread.ts");
