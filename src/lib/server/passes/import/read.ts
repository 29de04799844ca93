import type { Adjustable } from '@/lib/domain/types';
import { decodePassCsv, PASS_CSV_LIMITS, type ParsedPassFile, parsePassCsv } from '@/lib/pass-csv';
import { AppError, validationError } from '../../errors';

/** Of a whole upload: the file, its envelope and the other fields. */
export const UPLOAD_LIMIT_BYTES = PASS_CSV_LIMITS.bytes + 64 * 1024;

/** An uploaded file, its bytes, or its text. What a file is called plays no part. */
export type PassFile = File | Uint8Array | string;

export function isPassFile(value: unknown): value is PassFile {
  return value instanceof File || value instanceof Uint8Array || typeof value === 'string';
}

/** Reads a pass file. Throws VALIDATION or TOO_LARGE when it cannot be read at all; bad rows are in `refused`. */
export async function readPassFile(file: unknown, adjustables: readonly Adjustable[]): Promise<ParsedPassFile> {
  if (!isPassFile(file) || sizeOf(file) === 0) throw fileProblem('Choose a CSV file of passes.');
  if (sizeOf(file) > PASS_CSV_LIMITS.bytes) throw tooLarge();
  const decoded = typeof file === 'string' ? { text: file, fileError: null } : decodePassCsv(await bytesOf(file));
  if (decoded.text === null) throw fileProblem(decoded.fileError);
  const parsed = parsePassCsv(decoded.text, adjustables);
  if (parsed.fileError !== null) throw fileProblem(parsed.fileError);
  return parsed;
}

const fileProblem = (message: string) => validationError(message, { file: message });

function sizeOf(file: PassFile): number {
  if (typeof file === 'string') return file.length;
  return file instanceof File ? file.size : file.byteLength;
}

const bytesOf = async (file: File | Uint8Array): Promise<Uint8Array> =>
  file instanceof File ? new Uint8Array(await file.arrayBuffer()) : file;

function tooLarge(): AppError {
  const message = `The file is larger than ${PASS_CSV_LIMITS.bytes / 1024 / 1024} MB. Split it by season or event.`;
  return new AppError('TOO_LARGE', message, { file: message });
}
