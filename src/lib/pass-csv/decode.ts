import { PASS_CSV_LIMITS, tooLargeMessage } from './file-limits';

export type DecodedFile = { text: string; fileError: null } | { text: null; fileError: string };

const NOT_UTF8 = 'The file is not UTF-8 text. Save it as "CSV UTF-8" and try again.';
export const NOT_TEXT = 'The file is not a text file (it holds binary data). Export the table as CSV and try again.';

const refuse = (fileError: string): DecodedFile => ({ text: null, fileError });

/** Turns uploaded bytes into text. Refuses what is too large, not UTF-8 or not text, whatever the file is called. */
export function decodePassCsv(bytes: Uint8Array): DecodedFile {
  if (bytes.byteLength > PASS_CSV_LIMITS.bytes) return refuse(tooLargeMessage());
  if (isUtf16(bytes)) return refuse(NOT_UTF8);
  if (bytes.includes(0)) return refuse(NOT_TEXT);
  try {
    return { text: new TextDecoder('utf-8', { fatal: true }).decode(bytes), fileError: null };
  } catch {
    return refuse(looksBinary(bytes) ? NOT_TEXT : NOT_UTF8);
  }
}

function isUtf16(bytes: Uint8Array): boolean {
  return (bytes[0] === 0xff && bytes[1] === 0xfe) || (bytes[0] === 0xfe && bytes[1] === 0xff);
}

// Control characters other than tab, line feed, form feed and carriage return do not occur in a table.
function looksBinary(bytes: Uint8Array): boolean {
  return bytes.subarray(0, 1024).some((byte) => byte < 0x09 || (byte > 0x0d && byte < 0x20));
}
