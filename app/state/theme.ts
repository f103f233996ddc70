/** Light, dark, or as the system says; a choice of the machine, not of the project. */
export type Theme = 'system' | 'light' | 'dark';

const KEY = 'digit-assay-theme';

export function storedTheme(): Theme {
  try {
    const stored = localStorage.getItem(KEY);
    return stored === 'light' || stored === 'dark' ? stored : 'system';
  } catch {
    return 'system';
  }
}

export function applyTheme(theme: Theme): void {
  if (theme === 'system') delete document.documentElement.dataset.theme;
  else document.documentElement.dataset.theme = theme;
  try {
    if (theme === 'system') localStorage.removeItem(KEY);
    else localStorage.setItem(KEY, theme);
  } catch {
    // Storage may be forbidden; the choice then lasts as long as the page.
  }
}
