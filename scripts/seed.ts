import path from "node:path";

import { queue } from "@/lib/jobs/queue";
import { sequelize } from "@/models";
import { seedDemo } from "../seeders/demo";

/** Where the demo sign-ins are written: the first argument, SURDMARK_DEMO_FILE, or demo.json in the product's own folder. */
const file =
  process.argv[2] ??
  process.env.SURDMARK_DEMO_FILE ??
  path.join(process.env.LOCAL_FOLDER ?? ".local", "demo.json");

try {
  const made = await seedDemo(path.resolve(file));
  console.log(
    made ? "The demo work is made." : "The demo work was there already; its people have new passwords.",
  );
} catch (error) {
  console.error(error);
  process.exitCode = 1;
} finally {
  await Promise.allSettled([sequelize.close(), queue().close(true)]);
}
process.exit();
