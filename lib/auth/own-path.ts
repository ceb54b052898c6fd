/**
 * The path to go to after signing in: the one asked for when it is a path of this site, else `fallback`.
 * Whatever a browser could read as another address (`//host`, `/\host`, a scheme, control characters) is refused.
 */
export function ownPath(wanted: unknown, fallback = "/desk"): string {
  if (typeof wanted !== "string" || wanted.length > 500) return fallback;
  if (!/^\/(?![/\\])/.test(wanted) || /[\\\u0000-\u0020\u007f]/.test(wanted)) return fallback;
  const base = "https://own.invalid";
  const url = URL.canParse(wanted, base) ? new URL(wanted, base) : null;
  if (!url || url.origin !== base) return fallback;
  const decoded = safeDecode(url.pathname);
  if (decoded === null || /^\/[/\\]/.test(decoded)) return fallback;
  return url.pathname + url.search + url.hash;
}

function safeDecode(text: string): string | null {
  try {
    return decodeURIComponent(text);
  } catch {
    return null;
  }
}
