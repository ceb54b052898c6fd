// The first thing a newcomer runs: nothing is installed yet, and Node may be too old for the rest.
const [major, minor] = process.versions.node.split(".").map(Number);
if (major < 20 || (major === 20 && minor < 19)) {
  console.error(
    "Surdmark needs Node 20.19 or newer, and this is " +
      process.versions.node +
      ": install a newer one from https://nodejs.org and start again.",
  );
  process.exit(1);
}
const { main } = await import("./services/main.mjs");
await main({ dev: process.argv.includes("--dev"), showLogs: process.argv.includes("--logs") });
