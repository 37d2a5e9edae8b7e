/** Light, dark, or as the system says. Kept in a cookie, so that the server paints the first frame right. */
export const themes = ["system", "light", "dark"] as const;
export type Theme = (typeof themes)[number];

const cookieName = "ferrule-theme";
const year = 365 * 24 * 3600;

export function isTheme(text: unknown): text is Theme {
  return themes.some((theme) => theme === text);
}

export function readTheme(request: Request): Theme {
  const value = new RegExp(`(?:^|;\\s*)${cookieName}=(\\w+)`).exec(request.headers.get("cookie") ?? "")?.[1];
  return isTheme(value) ? value : "system";
}

/** The value of the `set-cookie` header. */
export function formatThemeCookie(theme: Theme): string {
  return `${cookieName}=${theme}; Path=/; Max-Age=${year}; SameSite=Lax`;
}
