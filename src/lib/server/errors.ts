/** Few error codes, one mapper to HTTP. Unknown errors are logged and never shown raw. */

export const HTTP_STATUS = {
  VALIDATION: 400,
  UNAUTHENTICATED: 401,
  FORBIDDEN: 403,
  NOT_FOUND: 404,
  NO_METHOD: 405,
  CONFLICT: 409,
  TOO_LARGE: 413,
  TOO_MANY: 429,
  INTERNAL: 500,
  UNAVAILABLE: 503,
} as const;

export type ErrorCode = keyof typeof HTTP_STATUS;

export class AppError extends Error {
  constructor(
    readonly code: ErrorCode,
    message: string,
    /** Field name to message, so a form can show it beside the input. */
    readonly fields?: Readonly<Record<string, string>>,
    /** Whole seconds after which the same request may be sent again (TOO_MANY). */
    readonly retryAfterS?: number,
  ) {
    super(message);
    this.name = 'AppError';
  }

  get status(): number {
    return HTTP_STATUS[this.code];
  }
}

export const validationError = (message: string, fields?: Record<string, string>) =>
  new AppError('VALIDATION', message, fields);
export const unauthenticated = () => new AppError('UNAUTHENTICATED', 'Sign in first.');
export const forbidden = () => new AppError('FORBIDDEN', 'Your role in this team does not allow this.');
/** A missing row and another team's row are the same refusal. */
export const notFound = (what: string) => new AppError('NOT_FOUND', `There is no such ${what} in your team.`);
export const conflict = (message: string) => new AppError('CONFLICT', message);
export const tooMany = (message: string, retryAfterS: number) =>
  new AppError('TOO_MANY', message, undefined, retryAfterS);
