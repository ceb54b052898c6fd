import { describe, expect, it } from "vitest";
import { readFileSync } from "node:fs";
import { readHalf, type Twice } from "@/lib/symbols/half";
import { quantityText, type Quantity } from "@/lib/symbols/quantity";
import { DEFAULT_CONVENTIONS, type Conventions } from "@/lib/verify/conventions";
import { publicFinding, verifyClaim } from "@/lib/verify/verify-claim";
import { verifyKey } from "@/lib/verify/verify-key";
import { contradictions } from "@/lib/verify/contradictions";
import { signedRootOf } from "@/lib/verify/signed-root";
import { anyForm, nonZero, randomFrom } from "./random";

const check = (quantity: string, claimed: string, change: Partial<Conventions> = {}) =>
  verifyClaim({ ref: "7.1", quantity, claimed }, { ...DEFAULT_CONVENTIONS, ...change });

describe("judging by exact comparison", () => {
  it("confirms 2,000 true claims in random equal forms", () => {
    const random = randomFrom(1);
    for (let n = 0; n < 2_000; n++) {
      const { quantity, value } = nonZero(random, 8);
      const [typed, claimed] = [quantityText(quantity), anyForm(random, value)];
      expect(`${typed} = ${claimed}: ${check(typed, claimed).verdict}`).toBe(
        `${typed} = ${claimed}: confirmed`,
      );
    }
  });

  it("confirms none of 2,000 false ones", () => {
    const random = randomFrom(2);
    for (let n = 0; n < 2_000; n++) {
      const { quantity, value } = nonZero(random, 8);
      const wrong = random.pick([
        signedRootOf(-value.sign, value.n, value.d),
        signedRootOf(value.sign, value.n * BigInt(random.whole(2, 30)), value.d),
        signedRootOf(value.sign, value.n * 1_000_000n + 1n, value.d * 1_000_000n),
        signedRootOf(0, 0n, 1n),
      ]);
      const finding = verifyClaim(
        { ref: "1", quantity: quantityText(quantity), claimed: anyForm(random, wrong) },
        DEFAULT_CONVENTIONS,
        { slips: false },
      );
      expect(finding.verdict).toBe("discrepant");
    }
  });

  it("agrees with the published values", () => {
    type Row = { kind: string; args: string[]; value: { sign: number; square: string }; match?: boolean };
    const rows = readFileSync(new URL("../reference-data/published.jsonl", import.meta.url), "utf8")
      .trim()
      .split("\n");
    const known = rows
      .map((row) => JSON.parse(row) as Row)
      .filter(({ kind }) => kind === "3j" || kind === "cg");
    expect(known.length).toBeGreaterThan(800);
    for (const { kind, args, value } of known) {
      const quantity = quantityText({
        kind: kind as Quantity["kind"],
        args: args.map((arg) => readHalf(arg) as Twice),
      });
      const claimed = value.sign === 0 ? "0" : `${value.sign < 0 ? "-" : ""}sqrt(${value.square})`;
      expect(`${quantity} ${check(quantity, claimed).verdict}`).toBe(`${quantity} confirmed`);
    }
  });

  it("gives the exact value three ways, the decimal with 20 significant digits", () => {
    expect(check("(1 1 2; 0 0 0)", "1").exact).toEqual({
      text: "sqrt(30)/15",
      latex: "\\frac{\\sqrt{30}}{15}",
      decimal: "0.36514837167011074230",
    });
    expect(check("<1/2 1/2 1/2 -1/2 | 0 0>", "1").exact?.decimal).toBe("0.70710678118654752440");
  });

  it("answers plain data that survives JSON", () => {
    for (const finding of [check("(1 1 2; 0 0 0)", "-1"), check("(1 1 1; 0 0 0)", "0"), check("(1 1", "x")]) {
      expect(JSON.parse(JSON.stringify(finding))).toEqual(finding);
    }
    expect(Object.keys(publicFinding(check("(1 1 2; 0 0 0)", "1")))).toEqual([
      "ref",
      "quantity",
      "claimed",
      "verdict",
      "exact",
      "slips",
      "place",
      "reason",
    ]);
    expect(Object.keys(publicFinding(check("(1 1 2; 0 0 0)", "-sqrt(2/15)")).slips[0] ?? {})).toEqual([
      "causes",
      "says",
      "certainty",
    ]);
  });
});

describe("decimals", () => {
  it.each([
    ["0.3651", "confirmed"],
    ["0.36515", "confirmed"],
    ["0.365", "confirmed"],
    ["0.4", "confirmed"],
    ["0.36514837167011074230", "confirmed"],
    ["0.3651...", "confirmed"],
    ["0.36514...", "confirmed"],
    ["3.651e-1", "confirmed"],
    ["0.36514", "discrepant"],
    ["0.3652", "discrepant"],
    ["0.3650", "discrepant"],
    ["0.3", "discrepant"],
    ["-0.3651", "discrepant"],
    ["0.36500", "discrepant"],
    ["0.366...", "discrepant"],
    ["0", "discrepant"],
    ["0.0", "discrepant"],
  ])("(1 1 2; 0 0 0) = %s is %s", (claimed, verdict) =>
    expect(check("(1 1 2; 0 0 0)", claimed).verdict).toBe(verdict),
  );

  it("may round a tie either way", () => {
    expect(check("<3/2 3/2 3/2 -3/2 | 0 0>", "0.5").verdict).toBe("confirmed");
    expect(check("<3/2 3/2 3/2 -3/2 | 0 0>", "0.50").verdict).toBe("confirmed");
    expect(check("<3/2 3/2 3/2 -3/2 | 0 0>", "0.51").verdict).toBe("discrepant");
  });

  it("is not in house form where the house prints roots", () =>
    expect(check("(1 1 2; 0 0 0)", "0.3651", { houseForm: "rationalised" }).verdict).toBe(
      "confirmed-not-house-form",
    ));
});

describe("house form", () => {
  it.each([
    ["rationalised", "sqrt(30)/15", "confirmed"],
    ["rationalised", "√30/15", "confirmed"],
    ["rationalised", "(1/15)*sqrt(30)", "confirmed"],
    ["rationalised", "sqrt(30) / 15", "confirmed"],
    ["rationalised", "sqrt(2/15)", "confirmed-not-house-form"],
    ["rationalised", "2*sqrt(30)/30", "confirmed-not-house-form"],
    ["single-root", "sqrt(2/15)", "confirmed"],
    ["single-root", "√(2/15)", "confirmed"],
    ["single-root", "sqrt(4/30)", "confirmed-not-house-form"],
    ["single-root", "sqrt(30)/15", "confirmed-not-house-form"],
    ["root-below", "sqrt(2)/sqrt(15)", "confirmed"],
    ["root-below", "sqrt(30)/15", "confirmed-not-house-form"],
    ["signed-square", "2/15", "confirmed"],
    ["signed-square", "sqrt(2/15)", "confirmed-not-house-form"],
    ["signed-square", "4/30", "confirmed-not-house-form"],
    ["any", "sqrt(4/30)", "confirmed"],
  ] as const)("%s: %s is %s", (houseForm, claimed, verdict) => {
    const finding = check("(1 1 2; 0 0 0)", claimed, { houseForm });
    expect(finding.verdict).toBe(verdict);
    if (verdict === "confirmed-not-house-form")
      expect(finding.reason).toContain(finding.houseForm?.text ?? "?");
  });

  it("always reads back as a confirmed claim", () => {
    const random = randomFrom(5);
    for (let n = 0; n < 300; n++) {
      const { quantity } = nonZero(random, 5);
      const conventions = {
        houseForm: random.pick([
          "any",
          "rationalised",
          "single-root",
          "root-below",
          "signed-square",
        ] as const),
        impliedRoot: random.next() < 0.5,
      };
      const typed = quantityText(quantity);
      const { houseForm, exact } = check(typed, "7", conventions);
      const again = check(typed, houseForm?.text ?? exact?.text ?? "", conventions);
      expect(`${typed} ${JSON.stringify(conventions)} ${again.claimed} ${again.verdict}`).toMatch(
        / confirmed$/,
      );
    }
  });
});

describe("other conventions", () => {
  it("names the order of the arguments that makes a claim right", () => {
    const finding = check("<1 1 0 0 | 2 0>", "sqrt(2/3)");
    expect(finding.verdict).toBe("discrepant");
    expect(finding.reason).toContain("The claim is right with the arguments in the order j1 j2 m1 m2.");
    expect(finding.rightUnder?.change).toEqual({ cgOrder: "j1j2m1m2" });
  });
  it("names the understood root", () => {
    expect(check("(1 1 2; 0 0 0)", "2/15").reason).toContain("right when a square root is understood");
    expect(check("<1 0 1 0 | 0 0>", "-1/3").rightUnder?.change).toEqual({ impliedRoot: true });
    expect(check("<1 1 0 0 | 2 0>", "2/3").rightUnder?.change).toEqual({
      cgOrder: "j1j2m1m2",
      impliedRoot: true,
    });
  });
  it("names a root that should not be understood", () =>
    expect(check("<3/2 3/2 3/2 -3/2 | 0 0>", "1/2", { impliedRoot: true }).reason).toContain(
      "without an understood root",
    ));
  it("is silent where none makes it right", () =>
    expect(check("(1 1 2; 0 0 0)", "7/11").rightUnder).toBeNull());
});

describe("vanishing values", () => {
  it.each([
    ["(1 1 1; 0 0 0)", "parity"],
    ["(1 1 3; 0 0 0)", "triangle"],
    ["(1 1 2; 1 1 0)", "projection-sum"],
    ["(1 1 1; 2 -2 0)", "projection-range"],
    ["(1 1 2; 1/2 -1/2 0)", "projection-kind"],
    ["(1/2 1 1; 1/2 0 0)", "sum-not-integer"],
    ["(2 3 3; 0 2 -2)", "accidental"],
  ])("%s = 0 with its reason: %s", (quantity, rule) => {
    const finding = check(quantity, "0");
    expect(finding.verdict).toBe("confirmed");
    expect(finding.zero.map((reason) => reason.rule)).toContain(rule);
    expect(finding.reason).toContain("It vanishes:");
    expect(check(quantity, "1/2").verdict).toBe("discrepant");
  });
});

describe("limits", () => {
  it("leaves undecided what passes one, with the reason", () => {
    expect(check("(5001 1 5000; 0 0 0)", "1")).toMatchObject({ verdict: "undecided", exact: null });
    expect(check("(1 1 2; 0 0 0)", "2^(2^31)").verdict).toBe("undecided");
    expect(check("(1 1 2; 0 0 0)", "9".repeat(300)).verdict).toBe("undecided");
    const live = verifyClaim(
      { ref: "1", quantity: "(200 1 200; 0 0 0)", claimed: "0" },
      DEFAULT_CONVENTIONS,
      { largestJ: 100 },
    );
    expect(live).toMatchObject({
      verdict: "undecided",
      reason: expect.stringContaining("up to 100") as string,
    });
  });
  it("gives what could be computed beside a value that cannot be read", () => {
    const finding = check("(1 1 2; 0 0 0)", "x");
    expect(finding).toMatchObject({ verdict: "unreadable", exact: { text: "sqrt(30)/15" }, reading: null });
    expect(finding.reason).toBe(
      "In the claimed value, at character 1: “x” is not read in a value; only the names sqrt, pi and i are.",
    );
    expect(check("(1 1", "x").errors.map((error) => error.field)).toEqual(["quantity", "claimed"]);
  });
});

describe("claims against each other", () => {
  it("names both and which one the exact value supports", () => {
    const { findings, summary } = verifyKey({
      claims: [
        { ref: "7.1", quantity: "(1 1 2; 0 0 0)", claimed: "sqrt(2/15)" },
        { ref: "7.2", quantity: "<1 0 1 0 | 2 0>", claimed: "-sqrt(2/3)" },
        { ref: "7.3", quantity: "(2 2 2; 0 0 0)", claimed: "1/7" },
      ],
    });
    expect(findings.map((finding) => finding.verdict)).toEqual(["confirmed", "contradicted", "discrepant"]);
    expect(findings[1]?.reason).toContain("contradicts claim 7.1, which the exact value supports");
    expect(findings[0]?.reason).toContain(
      "By symmetry claim 7.2 says otherwise; the exact value supports this claim.",
    );
    expect(summary).toEqual({
      confirmed: 1,
      "confirmed-not-house-form": 0,
      discrepant: 1,
      contradicted: 1,
      unreadable: 0,
      undecided: 0,
      total: 3,
    });
  });

  it("says when neither is right, and is silent when they agree", () => {
    const two = (first: string, second: string) =>
      verifyKey({
        claims: [
          { ref: "a", quantity: "(1 1 2; 0 0 0)", claimed: first },
          { ref: "b", quantity: "(2 1 1; 0 0 0)", claimed: second },
        ],
      }).findings.map(({ verdict, reason }) => `${verdict} ${reason}`);
    expect(two("1/3", "1/4")[0]).toMatch(/^contradicted .*supports neither/);
    expect(two("1/3", "1/3")[0]).toMatch(/^discrepant (?!.*symmetry)/);
    expect(two("sqrt(2/15)", "0.3651")[0]).toMatch(/^confirmed (?!.*symmetry)/);
  });

  it("never calls a right claim wrong, and stays quick on one large orbit", () => {
    const entries = Array.from({ length: 20_000 }, (_, n) => ({
      id: String(n),
      ref: `r${n}`,
      verdict: n === 0 ? ("confirmed" as const) : ("discrepant" as const),
      orbitKey: "3j 1",
      impliedCanonical: String(n % 5_000),
    }));
    const clashes = contradictions(entries);
    expect(clashes.get("0")).toMatchObject({ verdict: "confirmed" });
    expect(clashes.get("7")).toMatchObject({
      verdict: "contradicted",
      against: ["0"],
    });
  });
});

describe("a small value", () => {
  it("is not explained by a digit that leaves nothing but zeros", () => {
    const finding = verifyClaim(
      { ref: "1", quantity: "(200 200 200; 0 0 0)", claimed: "0.01" },
      DEFAULT_CONVENTIONS,
    );
    expect(finding.verdict).toBe("discrepant");
    expect(finding.slips.flatMap(({ causes }) => causes)).not.toContain("digit-slip");
  });
});
