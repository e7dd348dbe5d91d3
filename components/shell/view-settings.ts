/** How one person likes to read. Kept in cookies, so that the first byte of a page has it and nothing flashes. */
export type ViewSettings = { theme: 'system' | 'light' | 'dark'; contrast: 'normal' | 'more'; keys: 'on' | 'off' };

type Cookies = { get(name: string): { value: string } | undefined };
const among = <T extends string>(value: string | undefined, known: readonly T[], otherwise: T): T => known.find((one) => one === value) ?? otherwise;

export function readViewSettings(cookies: Cookies): ViewSettings {
  return {
    theme: among(cookies.get('theme')?.value, ['system', 'light', 'dark'], 'system'),
    contrast: among(cookies.get('contrast')?.value, ['normal', 'more'], 'normal'),
    keys: among(cookies.get('keys')?.value, ['on', 'off'], 'on'),
  };
}

/** Attributes of the root element; what is as usual is left out. */
export function viewAttributes(settings: ViewSettings): Record<`data-${string}`, string | undefined> {
  return {
    'data-theme': settings.theme === 'system' ? undefined : settings.theme,
    'data-contrast': settings.contrast === 'more' ? 'more' : undefined,
    'data-keys': settings.keys === 'off' ? 'off' : undefined,
  };
}

/** Writes one setting for a year and shows it at once. */
export function applyViewSetting(name: keyof ViewSettings, value: string): void {
  document.cookie = `${name}=${value}; Path=/; Max-Age=31536000; SameSite=Lax`;
  const usual = { theme: 'system', contrast: 'normal', keys: 'on' }[name];
  if (value === usual) delete document.documentElement.dataset[name];
  else document.documentElement.dataset[name] = value;
}
