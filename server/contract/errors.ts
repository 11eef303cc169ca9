/** One error for everything a person can be told: a code for the program, a message for the person. */
export const ERROR_STATUS = {
  'bad-input': 400,
  'signed-out': 401,
  'not-allowed': 403,
  'not-found': 404,
  conflict: 409,
  'too-large': 413,
  'too-many': 429,
  unavailable: 503,
  internal: 500,
} as const
export type ErrorCode = keyof typeof ERROR_STATUS

export class AppError extends Error {
  readonly code: ErrorCode
  /** Messages beside fields, by name. */
  readonly fields: Record<string, string> | undefined
  readonly retryAfterSeconds: number | undefined
  constructor(
    code: ErrorCode,
    message: string,
    more: { fields?: Record<string, string>; retryAfterSeconds?: number } = {},
  ) {
    super(message)
    this.name = 'AppError'
    this.code = code
    this.fields = more.fields
    this.retryAfterSeconds = more.retryAfterSeconds
  }
}

/** Body of every error answer of a route handler. */
export interface ErrorBody {
  error: { code: ErrorCode; message: string; fields?: Record<string, string>; id?: string }
}

/** What a form's action gives back; typed text never travels back, the form keeps it. */
export type ActionResult<T = undefined> =
  { ok: true; value: T } | { ok: false; message: string; fields?: Record<string, string> }
