import { spawnSync } from "node:child_process";
import { showHalf } from "@/lib/symbols/half";
import type { Quantity } from "@/lib/symbols/quantity";

/** Debian's SymPy, not one that happens to be first on the path. */
const PYTHON = "/usr/bin/python3";

const PROGRAM = `
import json, sys, time
import sympy
from sympy import Rational
from sympy.physics.wigner import wigner_3j
rows = [[Rational(x) for x in row] for row in json.load(sys.stdin)]
began = time.perf_counter()
values = [wigner_3j(*row) for row in rows]
seconds = (time.perf_counter() - began) / len(rows)
squares = [[int(sympy.sign(v)), str(v ** 2)] for v in values]
json.dump({"version": sympy.__version__, "seconds": seconds, "values": squares}, sys.stdout)
`;

/** A value as SymPy gives it: its sign and its square. */
export type SignedSquare = [number, string];
export type Sympy = { version: string; seconds: number; values: SignedSquare[] };

/** Times SymPy on the same 3j symbols in one process; null where it is not installed. */
export function sympy(sample: readonly Quantity[]): Sympy | null {
  const input = JSON.stringify(sample.map(({ args }) => args.map((entry) => showHalf(entry))));
  const run = spawnSync(PYTHON, ["-c", PROGRAM], { input, encoding: "utf8", timeout: 240_000 });
  return run.status === 0 ? (JSON.parse(run.stdout) as Sympy) : null;
}
