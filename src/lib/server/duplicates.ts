import { isUniqueViolation } from '@/db/violations';
import { AppError } from './errors';

/** Runs a write; a value that must be unique and is taken becomes a CONFLICT that names the field. */
export async function refuseDuplicate<T>(field: string, message: string, task: () => Promise<T>): Promise<T> {
  try {
    return await task();
  } catch (error) {
    if (isUniqueViolation(error)) throw new AppError('CONFLICT', message, { [field]: message });
    throw error;
  }
}

/** Throws VALIDATION when any problem was found; the first one becomes the message. */
export function refuseProblems(problems: Readonly<Record<string, string>>): void {
  const first = Object.values(problems)[0];
  if (first !== undefined) throw new AppError('VALIDATION', first, problems);
}
