// Sets up all that the tests need, runs them all, and closes with one line of counts.
const [major, minor] = process.versions.node.split(".").map(Number);
if (major < 20 || (major === 20 && minor < 19)) {
  console.error(
    "The tests need Node 20.19 or newer, and this is " +
      process.versions.node +
      ": install a newer one from https://nodejs.org and start again.",
  );
  process.exit(1);
}
const { main } = await import("./services/test-main.mjs");
await main();
