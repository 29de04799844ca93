/**
 * Text in a file a spreadsheet may open. A cell that begins with = + - @ tab or CR would be run as a formula, so it is written with a
 * leading ' (OWASP CSV Injection), which import takes off again. A text that itself begins with ' before such a sign gets one more.
 */
const WOULD_RUN = /^'*[=+\-@\t\r]/;
const GUARDED = /^'+[=+\-@\t\r]/;
// biome-ignore lint/suspicious/noControlCharactersInRegex: control characters are what is looked for
const CONTROL = /[\u0000-\u0008\u000b\u000c\u000e-\u001f\u007f]/;
// biome-ignore lint/suspicious/noControlCharactersInRegex: control characters are what is removed
const ALL_CONTROL = /[\u0000-\u0008\u000b\u000c\u000e-\u001f\u007f]/g;

export const guardText = (text: string): string => (WOULD_RUN.test(text) ? `'${text}` : text);
export const unguardText = (text: string): string => (GUARDED.test(text) ? text.slice(1) : text);

/** Whether a text holds characters that cannot be shown. */
export const hasControlCharacters = (text: string): boolean => CONTROL.test(text);
export const withoutControlCharacters = (text: string): string => text.replace(ALL_CONTROL, '');

/** One line, trimmed; runs of white space become one space. */
export const oneLine = (text: string): string => text.replace(/\s+/g, ' ').trim();
/** Several lines, trimmed, with LF between them. */
export const manyLines = (text: string): string => text.replace(/\r\n?/g, '\n').trim();
