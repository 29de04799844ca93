export const THEME_COOKIE = 'theme';
export const THEMES = ['auto', 'day', 'night'] as const;
export type Theme = (typeof THEMES)[number];

export const THEME_LABEL: Record<Theme, string> = { auto: 'Auto', day: 'Day', night: 'Night' };

/** Anything but a known name means "follow the device". */
export function themeFrom(value: unknown): Theme {
  return THEMES.find((theme) => theme === value) ?? 'auto';
}
