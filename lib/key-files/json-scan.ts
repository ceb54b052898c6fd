import { placeOf } from "./decode";
import { KEY_FILE_LIMITS, UnusableFile } from "./key-file";

/** Where each value of a JSON text begins, by its JSON Pointer. */
export type JsonPlaces = Map<string, number>;

type Frame = { kind: "object" | "array"; keys: Set<string>; key: string; index: number; pointer: string };

/**
 * Walks a JSON text once, without recursion, before it is handed to JSON.parse: refuses it past the depth limit, with a
 * key twice in one object, or with a key that would touch a prototype, and notes where each value stands. What is not
 * well-formed in other ways is left to JSON.parse.
 * @throws UnusableFile at the place of the fault
 */
export function scanJson(text: string): JsonPlaces {
  const places: JsonPlaces = new Map();
  const stack: Frame[] = [];
  const refuse = (at: number, says: string, pointer?: string): never => {
    throw new UnusableFile({ ...placeOf(text, at), says, ...(pointer === undefined ? {} : { pointer }) });
  };
  const here = () => {
    const frame = stack[stack.length - 1];
    if (!frame) return "";
    return `${frame.pointer}/${frame.kind === "array" ? frame.index : escapePointer(frame.key)}`;
  };
  let expectKey = false;
  for (let at = 0; at < text.length;) {
    const c = text[at] as string;
    const frame = stack[stack.length - 1];
    if (c === '"') {
      const end = endOfString(text, at);
      if (end < 0) refuse(at, "A string is opened here and never closed.");
      if (frame?.kind === "object" && expectKey) {
        const key = decodeString(text.slice(at, end));
        const pointer = `${frame.pointer}/${escapePointer(key)}`;
        if (frame.keys.has(key))
          refuse(at, `The key “${key.slice(0, 40)}” stands twice in one object.`, pointer);
        if (key === "__proto__") refuse(at, "The key “__proto__” is not allowed.", pointer);
        frame.keys.add(key);
        frame.key = key;
        expectKey = false;
      } else places.set(here(), at);
      at = end;
    } else if (c === "{" || c === "[") {
      places.set(here(), at);
      if (stack.length >= KEY_FILE_LIMITS.depth) {
        refuse(at, `The file is nested more than ${KEY_FILE_LIMITS.depth} deep; a key is three deep.`);
      }
      stack.push({
        kind: c === "{" ? "object" : "array",
        keys: new Set(),
        key: "",
        index: 0,
        pointer: here(),
      });
      expectKey = c === "{";
      at += 1;
    } else if (c === "}" || c === "]") {
      stack.pop();
      expectKey = false;
      at += 1;
    } else if (c === ",") {
      if (frame?.kind === "array") frame.index += 1;
      expectKey = frame?.kind === "object";
      at += 1;
    } else if (/[\s:]/.test(c)) at += 1;
    else {
      places.set(here(), at);
      at += 1;
      while (at < text.length && !/[\s,:{}[\]"]/.test(text[at] as string)) at += 1;
    }
  }
  return places;
}

function endOfString(text: string, start: number): number {
  for (let at = start + 1; at < text.length; at++) {
    if (text[at] === "\\") at += 1;
    else if (text[at] === '"') return at + 1;
    else if (text[at] === "\n") return -1;
  }
  return -1;
}

function decodeString(literal: string): string {
  try {
    return String(JSON.parse(literal));
  } catch {
    return literal.slice(1, -1);
  }
}

export function escapePointer(key: string): string {
  return key.replaceAll("~", "~0").replaceAll("/", "~1");
}

/** JSON.parse's complaint as a place in the text. */
export function jsonSyntaxError(text: string, error: unknown): UnusableFile {
  const message = error instanceof Error ? error.message : "";
  const position = /position (\d+)/.exec(message)?.[1];
  const offset = position === undefined ? text.length : Number(position);
  const found = offset >= text.length ? "the end of the file" : `“${text[offset] as string}”`;
  return new UnusableFile({
    ...placeOf(text, Math.min(offset, text.length)),
    says: `This is not well-formed JSON: ${found} is not expected here.`,
  });
}
