export type Theme = "light" | "dark" | "system";

/** The cookie that the server reads, so that the first paint already has the chosen theme. */
export const THEME_COOKIE = "theme";

/** Reads the cookie's value; anything unknown means "as the system has it". */
export function readTheme(value: string | undefined): Theme {
  return value === "light" || value === "dark" ? value : "system";
}

/** In the browser: shows the theme at once and keeps the choice for a year. */
export function applyTheme(theme: Theme): void {
  const root = document.documentElement;
  if (theme === "system") delete root.dataset.theme;
  else root.dataset.theme = theme;
  const secure = location.protocol === "https:" ? "; secure" : "";
  document.cookie = `${THEME_COOKIE}=${theme}; path=/; max-age=31536000; samesite=lax${secure}`;
}
