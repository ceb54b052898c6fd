export type Theme = "light" | "dark" | "system";

/** The cookie that the server reads, so that the first paint already has the chosen theme. */
export const THEME_COOKIE = "theme";

/** Reads the cookie's value; anything unknown means "as the system has it". */
export function readTheme(value: string | undefined): Theme {
  return value === "light" || value === "dark" ? value : "system";
}
