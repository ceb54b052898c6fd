import { spawnSync } from "node:child_process";
import Fraction from "fraction.js";
import { describe, expect, it } from "vitest";
import { equals, negate, root, ZERO } from "@/lib/symbols/exact";
import { toText } from "@/lib/symbols/exact-print";
import { fromTwice, showHalf } from "@/lib/symbols/half";
import { checked, quantityText, type Quantity } from "@/lib/symbols/quantity";
import { randomFrom } from "./data";

const PYTHON = "/usr/bin/python3";
const present = spawnSync(PYTHON, ["-c", "import sympy"], { timeout: 60_000 }).status === 0;
const seed = Number(process.env.SURDMARK_SEED ?? Date.now() % 1_000_000_007);

/** Reads lines `3j 1 1 2 0 0 0` and answers each with `sign square`. */
const SCRIPT = `
import sys
from sympy import Rational, S
from sympy.physics.wigner import wigner_3j, clebsch_gordan
for line in sys.stdin:
    kind, *entries = line.split()
    e = [Rational(t) for t in entries]
    if kind == "3j":
        value = wigner_3j(*e)
    else:  # j1 m1 j2 m2 J M
        value = clebsch_gordan(e[0], e[2], e[4], e[1], e[3], e[5])
    value = S(value)
    square = (value**2).expand() if value.is_number else value**2
    sign = 0 if value == 0 else (1 if value > 0 else -1)
    print(sign, Rational(square))
`;

/** An allowed 3j or CG with j ≤ 12. */
function randomSymbol(next: () => number): Quantity {
  const whole = (from: number, to: number) => from + Math.floor(next() * (to - from + 1));
  for (;;) {
    const [a, b] = [whole(0, 24), whole(0, 24)];
    const c = Math.abs(a - b) + 2 * whole(0, Math.min(a, b));
    const [x, y] = [a - 2 * whole(0, a), b - 2 * whole(0, b)];
    if (c > 24 || Math.abs(x + y) > c) continue;
    const kind = next() < 0.5 ? "3j" : "cg";
    const args = kind === "3j" ? [a, b, c, x, y, -x - y] : [a, x, b, y, c, x + y];
    return { kind, args: args.map((n) => fromTwice(n)) };
  }
}

describe("SymPy from Debian", () => {
  if (!present)
    console.info("SymPy is not installed (apt install python3-sympy): the comparison with it is skipped.");

  it.skipIf(!present)(
    "agrees on 500 random symbols with j ≤ 12",
    () => {
      console.info(`Seed of the comparison with SymPy: ${seed} (SURDMARK_SEED repeats it).`);
      const next = randomFrom(seed);
      const symbols = Array.from({ length: 500 }, () => randomSymbol(next));
      const input = symbols.map((q) => `${q.kind} ${q.args.map((t) => showHalf(t)).join(" ")}`).join("\n");
      const run = spawnSync(PYTHON, ["-c", SCRIPT], { input, encoding: "utf8", timeout: 120_000 });
      expect(run.status, run.stderr).toBe(0);
      const answers = run.stdout.trim().split("\n");
      expect(answers).toHaveLength(500);
      const differing = symbols.flatMap((q, n) => {
        const [sign, square] = (answers[n] as string).split(" ") as [string, string];
        const size = sign === "0" ? ZERO : root(new Fraction(square));
        const { value } = checked(q);
        return equals(value, sign === "-1" ? negate(size) : size)
          ? []
          : [`${quantityText(q)}: ${toText(value)}, SymPy ${answers[n]}`];
      });
      expect(differing, `seed ${seed}`).toEqual([]);
    },
    150_000,
  );
});
