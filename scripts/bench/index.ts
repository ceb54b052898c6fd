import { cpus, loadavg } from "node:os";

import { equals, toText } from "./values";
import { benchEngine, type Timed } from "./engine";
import { sympy } from "./sympy";
import { benchVerify } from "./verify";

/**
 * Timings of the engine and of the verifier, each the median of several rounds with its spread. Machines are shared and noisy,
 * so what counts is a ratio within one run: the engine's symbols are timed beside Debian's SymPy, value by value compared.
 */
const line = (cells: readonly string[]) => console.log(`| ${cells.join(" | ")} |`);

console.log(
  `Node ${process.version}, ${cpus()[0]?.model ?? "unknown processor"} × ${cpus().length}, load ${loadavg()[0]?.toFixed(2)}\n`,
);
line(["what", "number", "median", "fastest to slowest round"]);
line(["---", "---:", "---:", "---:"]);
const micro = (seconds: number) => `${(seconds * 1e6).toFixed(2)} µs each`;
const show = ({ what, number, median, low, high }: Timed) =>
  line([what, number.toLocaleString("en-GB"), micro(median), `${micro(low)} to ${micro(high)}`]);

const engine = benchEngine();
engine.timed.forEach(show);
benchVerify().forEach(show);

const theirs = sympy(engine.sample);
if (!theirs) {
  console.log("\nNo SymPy here (Debian: python3-sympy), so there is nothing to compare with.");
} else {
  const differ = engine.sample.filter((q, i) => !equals(q, theirs.values[i]!));
  console.log(
    `\nSymPy ${theirs.version} on ${engine.sample.length} of the same symbols: ${micro(theirs.seconds)}, ` +
      `${Math.round(theirs.seconds / engine.sampleSeconds).toLocaleString("en-GB")} times the engine's ${micro(engine.sampleSeconds)}; ` +
      `${differ.length} values differ${differ.length > 0 ? `: ${differ.map(toText).join(", ")}` : ""}.`,
  );
  if (differ.length > 0) process.exitCode = 1;
}
