import type { Exported, KeyContent } from "@/lib/keys/key-content";

/**
 * The key as JSON, whole. `sha256` is the hash of the canonical JSON (RFC 8785) of
 * everything but the two members `sha256` and `export`.
 */
export function keyAsJson(content: KeyContent, sha256: string, made: Exported): string {
  return `${JSON.stringify({ ...content, sha256, export: made }, null, 2)}\n`;
}
