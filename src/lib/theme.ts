/** How the pages look: as the system says, or as chosen on this device. */
export const THEMES = ["system", "light", "dark"] as const;
export type Theme = (typeof THEMES)[number];
const KEY = "perhundred.theme";

const isTheme = (value: string | null | undefined): value is Theme => THEMES.some((theme) => theme === value);

/** The choice kept on this device; `system` where none is, or none may be kept. */
export function readTheme(): Theme {
  try {
    const kept = localStorage.getItem(KEY);
    return isTheme(kept) ? kept : "system";
  } catch {
    return "system";
  }
}

/** Puts a theme into effect without keeping it. */
export function applyTheme(theme: Theme): void {
  if (theme === "system") delete document.documentElement.dataset.theme;
  else document.documentElement.dataset.theme = theme;
}

/** Puts a theme into effect and keeps it on this device. */
export function chooseTheme(theme: Theme): void {
  applyTheme(theme);
  try {
    if (theme === "system") localStorage.removeItem(KEY);
    else localStorage.setItem(KEY, theme);
  } catch {
    // A browser that keeps nothing still shows the theme until the page is closed.
  }
}
