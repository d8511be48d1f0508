/** The catalogue of what the API may answer instead of what was asked. One row a code; the sentence is for the user. */
export const ERRORS = {
  bad_request: { status: 400, message: 'The request could not be read.' },
  unreadable_body: { status: 400, message: 'The body could not be read as JSON.' },
  empty_file: { status: 400, message: 'The file is empty. Nothing was kept.' },
  no_file: { status: 400, message: 'No file came with the form. Send it in the field "file".' },
  not_signed_in: { status: 401, message: 'Sign in, or send a token, to do this.' },
  wrong_sign_in: { status: 401, message: 'E-mail and password do not belong together.' },
  wrong_code: {
    status: 401,
    message: 'This code is not right, or was used before. Wait for the next one and try that.',
  },
  no_workshop: {
    status: 403,
    message: 'You belong to no workshop at present. Ask an owner for an invitation.',
  },
  role_too_low: { status: 403, message: 'Your role in this workshop does not allow this.' },
  scope_too_low: { status: 403, message: 'This token may not do this.' },
  wrong_origin: { status: 403, message: 'This request came from another site and was refused.' },
  sign_up_closed: { status: 403, message: 'New workshops are by invitation here.' },
  own_review: { status: 403, message: 'A known-good is reviewed by somebody other than its author.' },
  not_found: { status: 404, message: 'There is no such thing here, or it is not yours to see.' },
  method_not_allowed: { status: 405, message: 'This address does not take that method.' },
  conflict: { status: 409, message: 'This does not fit what is there now.' },
  key_reused: { status: 409, message: 'This Idempotency-Key was used for something else.' },
  still_running: { status: 409, message: 'The first request with this Idempotency-Key is still running.' },
  already_made: { status: 409, message: 'This was made before; its secret is not shown again.' },
  samples_changed: { status: 409, message: 'The samples were read again since. Load the capture anew.' },
  not_ready: { status: 409, message: 'The capture is not measured yet.' },
  link_ended: {
    status: 410,
    message: 'This link has ended or was withdrawn. Ask the person who sent it for a new one.',
  },
  step_ended: {
    status: 410,
    message: 'The password was given too long ago, or the code was tried too often. Sign in again.',
  },
  stale: {
    status: 412,
    message: 'Somebody changed this since you opened it. Nothing of theirs was overwritten.',
  },
  too_large: { status: 413, message: 'The file is larger than this way of sending takes. Nothing was kept.' },
  wrong_media_type: { status: 415, message: 'The body has a media type that this address does not take.' },
  wrong_host: { status: 421, message: 'This server does not answer for that host.' },
  wrong_password: { status: 422, message: 'This is not your present password. Nothing was changed.' },
  invalid: { status: 422, message: 'Some fields need attention.' },
  too_many: { status: 429, message: 'That was tried too often. Wait a little and try again.' },
  internal: {
    status: 500,
    message: 'Something went wrong on our side. Nothing that you sent before was lost.',
  },
  service_away: {
    status: 503,
    message: 'The store or the database is away for the moment. Try again in a few seconds.',
  },
} as const satisfies Record<string, { status: number; message: string }>;

export type ErrorCode = keyof typeof ERRORS;

export interface ErrorOptions {
  readonly message?: string;
  readonly hint?: string;
  readonly details?: readonly { readonly path: string; readonly message: string }[];
  readonly retryAfterS?: number;
  /** For the log only. */
  readonly cause?: unknown;
}

/** A refusal that the user reads. Anything else that is thrown becomes `internal` and is only logged. */
export class ApiError extends Error {
  readonly code: ErrorCode;
  readonly status: number;
  readonly hint: string | undefined;
  readonly details: ErrorOptions['details'];
  readonly retryAfterS: number | undefined;

  constructor(code: ErrorCode, options: ErrorOptions = {}) {
    super(options.message ?? ERRORS[code].message, { cause: options.cause });
    this.name = 'ApiError';
    this.code = code;
    this.status = ERRORS[code].status;
    this.hint = options.hint;
    this.details = options.details;
    this.retryAfterS = options.retryAfterS;
  }

  /** The error shape of the API. */
  toBody() {
    return {
      error: {
        code: this.code,
        message: this.message,
        ...(this.hint === undefined ? {} : { hint: this.hint }),
        ...(this.details === undefined ? {} : { details: this.details }),
      },
    };
  }
}
