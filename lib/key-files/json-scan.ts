import { placeOf } from "./decode";
import { KEY_FILE_LIMITS, UnusableFile } from "./key-file";

/** Where each value of a JSON text begins, by its JSON Pointer. */
export type JsonPlaces = Map<string, number>;

type Expects = "value" | "value or ]" | "key" | "key or }" | "colon" | "comma" | "end";
type Frame = { kind: "object" | "array"; keys: Set<string>; key: string; index: number; pointer: string };

/**
 * Walks a JSON text once, without recursion, before it is handed to JSON.parse. JSON.parse takes the last of two equal
 * keys in silence, does not always say where it stopped, and recurses as deep as the text does.
 * @throws UnusableFile at the place where the text is not well-formed, nests past the limit, repeats a key in one
 *   object, or has a key that would touch a prototype
 */
export function scanJson(text: string): JsonPlaces {
  const places: JsonPlaces = new Map();
  const stack: Frame[] = [];
  let expects = "value" as Expects;

  const refuse = (at: number, says: string, pointer?: string): never => {
    throw new UnusableFile({ ...placeOf(text, at), says, ...(pointer === undefined ? {} : { pointer }) });
  };
  const unexpected = (at: number): never => {
    const wanted = {
      value: "a value",
      "value or ]": "a value or ]",
      key: "a key in quotation marks",
      "key or }": "a key in quotation marks or }",
      colon: "a colon",
      comma: stack[stack.length - 1]?.kind === "array" ? "a comma or ]" : "a comma or }",
      end: "the end of the file",
    }[expects];
    const found =
      at >= text.length ? "the end of the file" : `“${String.fromCodePoint(text.codePointAt(at) ?? 0)}”`;
    return refuse(at, `This is not well-formed JSON: ${wanted} is expected here, but there is ${found}.`);
  };
  const here = () => {
    const frame = stack[stack.length - 1];
    if (!frame) return "";
    return `${frame.pointer}/${frame.kind === "array" ? frame.index : escapePointer(frame.key)}`;
  };
  const takesValue = () => expects === "value" || expects === "value or ]";
  const afterValue = () => {
    expects = stack.length === 0 ? "end" : "comma";
  };

  for (let at = 0; at < text.length;) {
    const c = text[at] as string;
    const frame = stack[stack.length - 1];
    if (c === " " || c === "\n" || c === "\r" || c === "\t") at += 1;
    else if (c === '"') {
      const end = endOfString(text, at);
      if (end < 0) refuse(at, "A string is opened here and not closed on its line.");
      if (frame?.kind === "object" && (expects === "key" || expects === "key or }")) {
        const key =
          decodeString(text.slice(at, end)) ??
          refuse(at, "This string has an escape that JSON does not know.");
        const pointer = `${frame.pointer}/${escapePointer(key)}`;
        if (frame.keys.has(key))
          refuse(at, `The key “${key.slice(0, 40)}” stands twice in one object.`, pointer);
        if (key === "__proto__") refuse(at, "The key “__proto__” is not allowed.", pointer);
        frame.keys.add(key);
        frame.key = key;
        expects = "colon";
      } else {
        if (!takesValue()) unexpected(at);
        if (decodeString(text.slice(at, end)) === null) {
          refuse(at, "This string has an escape or a control character that JSON does not allow.", here());
        }
        places.set(here(), at);
        afterValue();
      }
      at = end;
    } else if (c === "{" || c === "[") {
      if (!takesValue()) unexpected(at);
      if (stack.length >= KEY_FILE_LIMITS.depth) {
        refuse(at, `The file is nested more than ${KEY_FILE_LIMITS.depth} deep; a key is three deep.`);
      }
      places.set(here(), at);
      stack.push({
        kind: c === "{" ? "object" : "array",
        keys: new Set(),
        key: "",
        index: 0,
        pointer: here(),
      });
      expects = c === "{" ? "key or }" : "value or ]";
      at += 1;
    } else if (c === "}" || c === "]") {
      const kind = c === "}" ? "object" : "array";
      const closes = expects === "comma" || expects === (kind === "object" ? "key or }" : "value or ]");
      if (frame?.kind !== kind || !closes) unexpected(at);
      stack.pop();
      afterValue();
      at += 1;
    } else if (c === ",") {
      if (!frame || expects !== "comma") unexpected(at);
      else {
        frame.index += 1;
        expects = frame.kind === "object" ? "key" : "value";
      }
      at += 1;
    } else if (c === ":") {
      if (expects !== "colon") unexpected(at);
      expects = "value";
      at += 1;
    } else {
      LITERAL.lastIndex = at;
      const literal = LITERAL.exec(text)?.[0];
      if (!takesValue() || literal === undefined) return unexpected(at);
      places.set(here(), at);
      afterValue();
      at += literal.length;
    }
  }
  if (expects !== "end") unexpected(text.length);
  return places;
}

const LITERAL = /(?:true|false|null|-?(?:0|[1-9]\d*)(?:\.\d+)?(?:[eE][+-]?\d+)?)(?![\w.+-])/y;

function endOfString(text: string, start: number): number {
  for (let at = start + 1; at < text.length; at++) {
    if (text[at] === "\\") at += 1;
    else if (text[at] === '"') return at + 1;
    else if (text[at] === "\n") return -1;
  }
  return -1;
}

/** The text of a string literal; null when it is not well-formed. */
function decodeString(literal: string): string | null {
  try {
    return String(JSON.parse(literal));
  } catch {
    return null;
  }
}

export function escapePointer(key: string): string {
  return key.replaceAll("~", "~0").replaceAll("/", "~1");
}
