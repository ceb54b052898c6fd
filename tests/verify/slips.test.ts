import { readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";
import { readHalf, type Twice } from "@/lib/symbols/half";
import { evaluate, quantityText, type Quantity } from "@/lib/symbols/quantity";
import { DEFAULT_CONVENTIONS } from "@/lib/verify/conventions";
import { asSignedRoot, rooted, signedRootOf, squarePart, type SignedRoot } from "@/lib/verify/signed-root";
import { SLIPS, type SlipId } from "@/lib/verify/slips";
import { verifyClaim } from "@/lib/verify/verify-claim";
import { anyForm, nonZero, randomFrom, type Random } from "./random";

type Seed = { quantity: Quantity; value: SignedRoot };
/** Makes a wrong claim by one slip, written here apart from the catalogue; null where the slip does nothing. */
type Plant = (random: Random, seed: Seed) => string | null;

const odd = (doubled: number) => Math.abs(doubled) % 4 === 2;
const six = ({ kind, args }: Quantity) => {
  const [a, b, c, d, e, f] = args as readonly number[] as [number, number, number, number, number, number];
  return kind === "3j"
    ? { j1: a, j2: b, j3: c, m1: d, m2: e, m3: f }
    : { j1: a, j2: c, j3: e, m1: b, m2: d, m3: -f };
};
const valueOf = (kind: Quantity["kind"], args: number[]) =>
  asSignedRoot(evaluate({ kind, args: args.map((n) => (n === 0 ? 0 : n) as Twice) }));

/** value·sign·√(n/d) in some form. */
function times(random: Random, { sign, n, d }: SignedRoot, by: number, over: number, flip = false): string {
  return anyForm(random, signedRootOf(flip ? -sign : sign, n * BigInt(by), d * BigInt(over)));
}
const flipIf =
  (when: (q: ReturnType<typeof six>, kind: string) => boolean): Plant =>
  (random, { quantity, value }) =>
    when(six(quantity), quantity.kind) ? times(random, value, 1, 1, true) : null;

function element(random: Random, { value }: Seed, other: SignedRoot | null): string | null {
  if (!other || other.sign === 0) return null;
  return other.sign === value.sign && other.n === value.n && other.d === value.d
    ? null
    : anyForm(random, other);
}

function misprinted(random: Random, text: string): string | null {
  const places = [...text.matchAll(/\d/g)].map((match) => match.index);
  const at = random.pick(places);
  const digit = random.pick([..."123456789"].filter((each) => each !== text[at]));
  return random.pick([
    text.slice(0, at) + digit + text.slice(at + 1),
    text.slice(0, at) + digit + text.slice(at),
    /\d/.test(text[at + 1] ?? "") && text[at + 1] !== "0" ? text.slice(0, at) + text.slice(at + 1) : null,
  ]);
}

function decimal({ sign, n, d }: SignedRoot, places: number, round: (digits: bigint) => bigint): string {
  // ten extra places, by integer square root
  const scale = 10n ** BigInt(places + 10);
  let r = BigInt(Math.ceil(Math.sqrt(Number((n * scale * scale) / d)))) + 1n;
  const target = (n * scale * scale) / d;
  for (let next = (r + target / r) >> 1n; next < r; next = (r + target / r) >> 1n) r = next;
  const digits = round(r)
    .toString()
    .padStart(places + 1, "0");
  return `${sign < 0 ? "-" : ""}${digits.slice(0, -places)}.${digits.slice(-places)}`;
}
const E10 = 10n ** 10n;

const PLANTS: Record<SlipId, Plant> = {
  "overall-sign": (random, { value }) => times(random, value, 1, 1, true),
  "phase-omitted": flipIf(({ j1, j2, m3 }) => odd(j1 - j2 - m3)),
  "coupling-order": flipIf(({ j1, j2, j3 }) => odd(j1 + j2 - j3)),
  "odd-permutation": flipIf(({ j1, j2, j3 }) => odd(j1 + j2 + j3)),
  "projections-reversed": flipIf(({ j1, j2, j3 }, kind) => odd(kind === "cg" ? j1 + j2 - j3 : j1 + j2 + j3)),
  "cg-for-3j": (random, { quantity, value }) => {
    const { j1, j2, j3, m3 } = six(quantity);
    if (quantity.kind !== "3j" || (j3 === 0 && !odd(j1 - j2 - m3))) return null;
    return times(random, value, j3 + 1, 1, odd(j1 - j2 - m3));
  },
  "3j-for-cg": (random, { quantity, value }) => {
    const { j1, j2, j3, m3 } = six(quantity);
    if (quantity.kind !== "cg" || (j3 === 0 && !odd(j1 - j2 - m3))) return null;
    return times(random, value, 1, j3 + 1, odd(j1 - j2 - m3));
  },
  "dimension-factor": (random, { quantity, value }) => {
    const { j1, j3 } = six(quantity);
    if (j3 === 0 || j1 === j3) return null;
    const [by, over] = random.pick([
      [j3 + 1, 1],
      [j3 + 1, j1 + 1],
    ] as const);
    return quantity.kind === "3j" ? times(random, value, by, over) : times(random, value, over, by);
  },
  "m3-sign": (random, { quantity, value }) =>
    six(quantity).m3 === 0
      ? null
      : six(quantity).m3 % 2 !== 0 && random.next() < 0.5
        ? times(random, value, 1, 1, true)
        : "0",
  "arguments-reordered": (random, seed) => {
    const { j1, j2, j3, m1, m2, m3 } = six(seed.quantity);
    const other =
      seed.quantity.kind === "3j"
        ? valueOf("3j", [j1, j2, j3, m2, m1, m3])
        : valueOf("cg", [j1, m2, j2, m1, j3, -m3]);
    return element(random, seed, other);
  },
  "neighbour-entry": (random, seed) => {
    const { j1, j2, j3, m1, m2, m3 } = six(seed.quantity);
    const step = random.pick([2, -2]);
    const other = random.pick([
      () =>
        seed.quantity.kind === "3j"
          ? valueOf("3j", [j1, j2, j3 + step, m1, m2, m3])
          : valueOf("cg", [j1, m1, j2, m2, j3 + step, -m3]),
      () =>
        seed.quantity.kind === "3j"
          ? valueOf("3j", [j1, j2, j3, m1 + step, m2 - step, m3])
          : valueOf("cg", [j1, m1 + step, j2, m2 - step, j3, -m3]),
    ]);
    if (j3 + step < 0) return null;
    return element(random, seed, other());
  },
  "doubled-arguments": (random, seed) =>
    element(
      random,
      seed,
      valueOf(
        seed.quantity.kind,
        seed.quantity.args.map((arg) => 2 * arg),
      ),
    ),
  "square-for-value": (random, { value: { n, d } }) =>
    n === d ? null : anyForm(random, signedRootOf(1, n * n, d * d)),
  "implied-root": (random, { value: { sign, n, d } }) => (n === d ? null : `${sign < 0 ? "-" : ""}${n}/${d}`),
  "value-for-square": (random, { value }) => {
    const root = rooted(value);
    return root && value.n !== value.d ? anyForm(random, root) : null;
  },
  "root-extent": (random, { value: { sign, n, d } }) => {
    const minus = sign < 0 ? "-" : "";
    const below = squarePart(d);
    if (d === 1n || n === d) return null;
    const choices = [`${minus}sqrt(${n})/${d}`];
    if (below.outside !== 1n && below.inside === 1n) choices.push(`${minus}sqrt(${n}/${below.outside})`);
    return random.pick(choices);
  },
  "sign-under-root": (_random, { value: { sign, n, d } }) => (sign < 0 ? `sqrt(-${n}/${d})` : null),
  "upside-down": (random, { value: { sign, n, d } }) =>
    n === d ? null : anyForm(random, signedRootOf(sign, d, n)),
  "factor-of-two": (random, { value }) =>
    times(
      random,
      value,
      ...random.pick([
        [4, 1],
        [1, 4],
        [2, 1],
        [1, 2],
      ] as [number, number][]),
    ),
  "digit-slip": (random, { value: { sign, n, d } }) => {
    const minus = sign < 0 ? "-" : "";
    const [above, below] = [squarePart(n), squarePart(d)];
    const right = random.pick([
      `${minus}sqrt(${n}/${d})`,
      `${minus}${above.outside}*sqrt(${above.inside * below.inside})/${below.outside * below.inside}`,
    ]);
    return misprinted(random, right);
  },
  "rounded-wrongly": (random, { value }) => {
    const { n, d } = value;
    if (squarePart(n).inside === 1n && squarePart(d).inside === 1n) return null;
    return decimal(value, random.whole(3, 6), (x) => (x % E10 < E10 / 2n ? x / E10 + 1n : x / E10));
  },
  "cut-off": (random, { value }) => {
    const { n, d } = value;
    if (squarePart(n).inside === 1n && squarePart(d).inside === 1n) return null;
    return decimal(value, random.whole(3, 6), (x) => (x % E10 > E10 / 2n ? x / E10 : x / E10));
  },
};

const CLAIMS = 80;

function judged(seed: Seed, claimed: string) {
  const quantity = quantityText(seed.quantity);
  return verifyClaim({ ref: "1", quantity, claimed }, DEFAULT_CONVENTIONS);
}

describe("diagnosis of planted slips, j ≤ 6", () => {
  it.each(Object.keys(SLIPS) as SlipId[])("%s stands first in at least 95 of 100", (id) => {
    const random = randomFrom(4_000 + Object.keys(SLIPS).indexOf(id));
    let [made, first, tries] = [0, 0, 0];
    const missed: string[] = [];
    while (made < CLAIMS && tries++ < 20_000) {
      const seed = nonZero(random, id === "doubled-arguments" ? 4 : 6);
      const claimed = PLANTS[id](random, seed);
      if (claimed === null) continue;
      const finding = judged(seed, claimed);
      if (finding.verdict === "confirmed" || finding.verdict === "unreadable") continue;
      made += 1;
      if (finding.slips[0]?.causes.includes(id)) first += 1;
      else
        missed.push(
          `${finding.quantity} ${claimed}: ${finding.slips.map((slip) => slip.causes.join("+")).join(" | ")}`,
        );
    }
    expect(made).toBe(CLAIMS);
    expect(first / made, missed.slice(0, 10).join("\n")).toBeGreaterThanOrEqual(0.95);
  });

  it("explains two slips together in most cases", () => {
    const random = randomFrom(77);
    let [made, found] = [0, 0];
    while (made < 100) {
      const seed = nonZero(random, 6, "3j");
      const { j1, j2, j3, m3 } = six(seed.quantity);
      if (j3 === 0) continue;
      const finding = judged(seed, times(random, seed.value, j3 + 1, 1, !odd(j1 - j2 - m3)));
      if (finding.verdict === "confirmed") continue;
      made += 1;
      if (
        finding.slips.some(
          ({ causes }) => causes.includes("cg-for-3j") || causes.includes("dimension-factor"),
        )
      )
        found += 1;
    }
    expect(found).toBeGreaterThanOrEqual(90);
  });
});

describe("wrong values that no slip made", () => {
  it.each([
    [
      "roots of small fractions",
      (random: Random) =>
        signedRootOf(random.pick([1, -1]), BigInt(random.whole(1, 40)), BigInt(random.whole(1, 80))),
    ],
    [
      "roots of large fractions",
      (random: Random) =>
        signedRootOf(random.pick([1, -1]), BigInt(random.whole(1, 400)), BigInt(random.whole(1, 2000))),
    ],
  ])("are called likely in at most 2 of 100: %s", (_name, draw) => {
    const random = randomFrom(9);
    let [made, likely] = [0, 0];
    while (made < 250) {
      const seed = nonZero(random, 6);
      const value = draw(random);
      const finding = judged(seed, `${value.sign < 0 ? "-" : ""}sqrt(${value.n}/${value.d})`);
      if (finding.verdict === "confirmed") continue;
      made += 1;
      if (finding.slips.some(({ certainty }) => certainty === "likely")) likely += 1;
    }
    expect(likely).toBeLessThanOrEqual(0.02 * made);
  });

  it("never offers more than three explanations, each with a sentence and a relation", () => {
    const random = randomFrom(31);
    for (let n = 0; n < 200; n++) {
      const { slips } = judged(nonZero(random, 6), anyForm(random, nonZero(random, 3).value));
      expect(slips.length).toBeLessThanOrEqual(3);
      for (const slip of slips) {
        expect(slip.says).toMatch(/^.{20,}\.$/su);
        expect(slip.formulaLatex).not.toBe("");
        expect(new Set(slip.causes).size).toBe(slip.causes.length);
      }
    }
  });
});

describe("published misprints", () => {
  type Row = { kind: string; args: string[]; match?: boolean; printed?: { sign: number; square: string } };
  const rows = readFileSync(new URL("../reference-data/published.jsonl", import.meta.url), "utf8")
    .trim()
    .split("\n")
    .map((line) => JSON.parse(line) as Row)
    .filter((row) => row.match === false && (row.kind === "3j" || row.kind === "cg"));

  it("are all there", () => expect(rows).toHaveLength(4));

  it.each(rows)("$kind $args is diagnosed as a sign", (row) => {
    const args = row.args.map((arg) => readHalf(arg) as Twice);
    const quantity = quantityText({ kind: row.kind as Quantity["kind"], args });
    const claimed = `${(row.printed?.sign ?? 1) < 0 ? "-" : ""}sqrt(${row.printed?.square ?? ""})`;
    const finding = verifyClaim({ ref: "1", quantity, claimed }, DEFAULT_CONVENTIONS);
    expect(finding.verdict).toBe("discrepant");
    expect(finding.slips[0]?.causes).toContain("overall-sign");
    expect(finding.slips[0]?.certainty).toBe("likely");
  });
});

describe("what is said of a slip", () => {
  const says = (quantity: string, claimed: string) => {
    const [slip] = verifyClaim({ ref: "1", quantity, claimed }, DEFAULT_CONVENTIONS).slips;
    return `${slip?.certainty}: ${slip?.says}`;
  };

  it("puts the numbers in", () => {
    expect(says("(1 1 2; 0 0 0)", "sqrt(2/3)")).toBe(
      "likely: This is the CG coefficient <1 0 1 0 | 2 0>; the 3j symbol differs from it by (−1)^(j1−j2−m3)/√(2j3+1), here (−1)^(1−1−0)/√5; the same value also comes from: dimension factor wrong.",
    );
    expect(says("<1 0 1 0 | 2 0>", "sqrt(2)/3")).toContain("√2/3 stands for √(2/3)");
    expect(says("<2 1 1 0 | 3 1>", "sqrt(8/51)")).toBe(
      "possible: One digit is wrong: with 15 in place of 51 the value is right.",
    );
    expect(says("(1 1 2; 0 0 0)", "0.36514")).toBe(
      "likely: The digits were cut off; rounded to 5 decimals the value is 0.36515.",
    );
    expect(says("(2 1 1; 0 0 0)", "-sqrt(2/15)")).toBe(
      "likely: The sign is the opposite one, as when the phase (−1)^(j1−j2−m3) = −1 is left out.",
    );
  });

  it("says nothing of a value that fits no slip", () => {
    expect(
      verifyClaim({ ref: "1", quantity: "(5/2 2 3/2; 1/2 0 -1/2)", claimed: "7/11" }, DEFAULT_CONVENTIONS)
        .slips,
    ).toEqual([]);
  });
});
