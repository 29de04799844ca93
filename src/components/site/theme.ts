export const THEME_COOKIE = 'theme';
export const THEMES = ['auto', 'day', 'night'] as const;
export type Theme = (typeof THEMES)[number];

export const THEME_LABEL: Record<Theme, string> = { auto: 'Auto', day: 'Day', night: 'Night' };

/** Anything but a known name means "follow the device". */
export function themeFrom(value: unknown): Theme {
  return THEMES.find((theme) => theme === value) ?? 'auto';
}

/** A path on this host to return to, or "/". Refuses other hosts, scheme-relative and backslash tricks. */
export function samePath(value: unknown): string {
  if (typeof value !== 'string' || !/^\/(?![/\\])[^\\\s]*$/.test(value)) return '/';
  return value;
}
