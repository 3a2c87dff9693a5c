export const ERROR_STATUS = {
  UNAUTHENTICATED: 401,
  LOCKED: 423,
  FORBIDDEN: 403,
  NOT_FOUND: 404,
  INVALID: 422,
  CONFLICT: 409,
  PRECONDITION: 409,
  RATE_LIMITED: 429,
  INTERNAL: 500,
} as const
export type ErrorCode = keyof typeof ERROR_STATUS

/** The answer to a failed request. `fields` maps an input name (dotted path) to what would be right. */
export type ErrorDto = { code: ErrorCode; message: string; fields?: Record<string, string>; requestId: string }

/** An expected refusal. Its message is shown to the person as it stands. */
export class AppError extends Error {
  readonly code: ErrorCode
  readonly fields: Record<string, string> | undefined

  constructor(code: ErrorCode, message: string, fields?: Record<string, string>) {
    super(message)
    this.name = 'AppError'
    this.code = code
    this.fields = fields
  }
}

/** A refusal that stands in the audit log already, written where it was decided. */
export class AuditedRefusal extends AppError {}

/** A value that is wrong at one field, said in words that tell what would be right. */
export function invalidField(field: string, message: string): AppError {
  return new AppError('INVALID', 'Please look at the marked field.', { [field]: message })
}
