import type { Expression } from "./expression";

/** A typed value as LaTeX, in the form in which it was typed (fractions as fractions, roots as roots). */
export function latexOf(tree: Expression, decimalMark: "." | "," = "."): string {
  return write(tree, decimalMark);
}

function write(tree: Expression, mark: "." | ","): string {
  switch (tree.type) {
    case "number":
      if (tree.text === "½") return `\\frac{${tree.value.n}}{${tree.value.d}}`;
      return decimal(tree.text, mark);
    case "pi":
      return "\\pi";
    case "i":
      return "\\mathrm{i}";
    case "negative":
      return `-${isSum(tree.of) ? inParentheses(tree.of, mark) : write(tree.of, mark)}`;
    case "root":
      return `\\sqrt{${write(tree.of, mark)}}`;
    case "sum":
      return `${write(tree.left, mark)} + ${signed(tree.right, mark)}`;
    case "difference":
      return `${write(tree.left, mark)} - ${isSum(tree.right) || tree.right.type === "negative" ? inParentheses(tree.right, mark) : write(tree.right, mark)}`;
    case "product": {
      const left = factor(tree.left, mark);
      const right =
        tree.right.type === "negative" ? inParentheses(tree.right, mark) : factor(tree.right, mark);
      return `${left}${/^[\d({]/.test(right) && !right.startsWith("\\") ? " \\cdot " : " "}${right}`;
    }
    case "quotient":
      if (tree.left.type === "negative" && !isSum(tree.left.of)) {
        return `-${write({ ...tree, left: tree.left.of }, mark)}`;
      }
      return `\\frac{${write(tree.left, mark)}}{${write(tree.right, mark)}}`;
    case "power": {
      const simple =
        tree.left.type === "pi" ||
        tree.left.type === "i" ||
        (tree.left.type === "number" && tree.left.text !== "½");
      return `${simple ? write(tree.left, mark) : inParentheses(tree.left, mark)}^{${exponent(tree.right, mark)}}`;
    }
  }
}

const isSum = (tree: Expression) => tree.type === "sum" || tree.type === "difference";

function signed(tree: Expression, mark: "." | ","): string {
  return tree.type === "negative" ? inParentheses(tree, mark) : write(tree, mark);
}

function factor(tree: Expression, mark: "." | ","): string {
  return isSum(tree) ? inParentheses(tree, mark) : write(tree, mark);
}

function inParentheses(tree: Expression, mark: "." | ","): string {
  return `\\left(${write(tree, mark)}\\right)`;
}

function exponent(tree: Expression, mark: "." | ","): string {
  if (tree.type === "quotient" && tree.left.type !== "quotient") {
    return `${write(tree.left, mark)}/${write(tree.right, mark)}`;
  }
  if (tree.type === "negative") return `-${exponent(tree.of, mark)}`;
  return write(tree, mark);
}

function decimal(text: string, mark: "." | ","): string {
  const [mantissa = "", power] = text.toLowerCase().split("e");
  const digits = mark === "," ? mantissa.replace(".", "{,}") : mantissa;
  return power === undefined ? digits : `${digits} \\cdot 10^{${Number(power)}}`;
}
