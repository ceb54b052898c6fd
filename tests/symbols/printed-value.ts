/**
 * A little reader of printed values, made only for these tests and knowing nothing of the engine: it works out typed
 * notation or LaTeX with fixed-point numbers of 90 decimals, as a pair (real part, imaginary part).
 */
const PLACES = 90;
const SCALE = 10n ** BigInt(PLACES);
const PI = BigInt(
  "31415926535897932384626433832795028841971693993751058209749445923078164062862089986280348253421170679".slice(
    0,
    PLACES + 1,
  ),
);

type Complex = [bigint, bigint];

const times = ([a, b]: Complex, [c, d]: Complex): Complex => [
  (a * c - b * d) / SCALE,
  (a * d + b * c) / SCALE,
];
const over = (x: Complex, [c, d]: Complex): Complex => {
  const size = c * c + d * d;
  const [re, im] = [x[0] * c + x[1] * d, x[1] * c - x[0] * d];
  return [(re * SCALE) / size, (im * SCALE) / size];
};

function floorRoot(n: bigint): bigint {
  let [low, high] = [0n, 1n << BigInt(Math.ceil(n.toString(2).length / 2) + 1)];
  while (low < high) {
    const middle = (low + high + 1n) / 2n;
    if (middle * middle <= n) low = middle;
    else high = middle - 1n;
  }
  return low;
}

/** The printed value to 60 places as [real, imaginary], each a whole number of 10^-60. */
export function readPrinted(text: string): [bigint, bigint] {
  const plain = text
    .replace(/\\left|\\right/g, "")
    .replace(/\\pi/g, "pi")
    .replace(/\^\{([^}]*)\}/g, "^($1)");
  const tokens = plain.match(/\\frac|\\sqrt|sqrt|pi|\d+|[-+*/^(){}i]/g) ?? [];
  let at = 0;
  const take = (token: string) => {
    if (tokens[at++] !== token) throw new Error(`${token} expected in ${text}`);
  };
  const group = (): Complex => {
    const open = tokens[at];
    take(open === "{" ? "{" : "(");
    const inside = sum();
    take(open === "{" ? "}" : ")");
    return inside;
  };
  const rootOf = ([re, im]: Complex): Complex => {
    if (im !== 0n || re < 0n) throw new Error("only roots of numbers that are not negative are printed");
    return [floorRoot(re * SCALE), 0n];
  };
  const atom = (): Complex => {
    const token = tokens[at] as string;
    if (token === "(" || token === "{") return group();
    at++;
    if (/^\d+$/.test(token)) return [BigInt(token) * SCALE, 0n];
    if (token === "pi") return [PI, 0n];
    if (token === "i") return [0n, SCALE];
    if (token === "sqrt" || token === "\\sqrt") return rootOf(group());
    if (token === "\\frac") return over(group(), group());
    throw new Error(`${token} not expected in ${text}`);
  };
  const powered = (): Complex => {
    const base = atom();
    if (tokens[at] !== "^") return base;
    at++;
    const [twice] = times(atom(), [2n * SCALE, 0n]);
    const step = rootOf(base);
    let result: Complex = [SCALE, 0n];
    for (let n = 0n; n < twice / SCALE; n++) result = times(result, step);
    return result;
  };
  const product = (): Complex => {
    let result = powered();
    for (;;) {
      const token = tokens[at];
      if (token === "*") at++;
      if (token === "/") {
        at++;
        result = over(result, powered());
      } else if (token === "*" || (token !== undefined && !/[-+)}]/.test(token)))
        result = times(result, powered());
      else return result;
    }
  };
  const sum = (): Complex => {
    let sign = 1n;
    if (tokens[at] === "-") [sign, at] = [-1n, at + 1];
    const first = product();
    let result: Complex = [sign * first[0], sign * first[1]];
    while (tokens[at] === "+" || tokens[at] === "-") {
      const s = tokens[at++] === "+" ? 1n : -1n;
      const next = product();
      result = [result[0] + s * next[0], result[1] + s * next[1]];
    }
    return result;
  };
  const value = sum();
  if (at !== tokens.length) throw new Error(`${text} was not read to its end`);
  return [value[0] / 10n ** 30n, value[1] / 10n ** 30n];
}
