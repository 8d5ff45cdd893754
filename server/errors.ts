/** What was found, what is wanted, what to do: shown to the person as it is. */
export interface ErrorDetail {
  found?: string;
  wanted?: string;
  advice?: string;
  errors?: { path: string; message: string }[];
  /** The version that stands, with a conflict. */
  current?: unknown;
  /** Longitude and latitude of what is wrong with a drawing. */
  at?: [lon: number, lat: number];
  retryAfterSeconds?: number;
}

export type ErrorKind =
  'invalid' | 'signed-out' | 'forbidden' | 'missing' | 'conflict' | 'too-large' | 'too-many' | 'no-room';

/** An error a caller can do something about. Its code is stable; middleware/problem.ts maps its kind to an HTTP status. */
export abstract class AppError extends Error {
  abstract readonly code: string;
  abstract readonly kind: ErrorKind;
  constructor(
    message: string,
    readonly detail: ErrorDetail = {},
  ) {
    super(message);
  }
}

export class InvalidInput extends AppError {
  readonly kind = 'invalid';
  constructor(
    message: string,
    detail: ErrorDetail = {},
    readonly code = 'invalid-input',
  ) {
    super(message, detail);
  }
}
export class NotSignedIn extends AppError {
  readonly code = 'not-signed-in';
  readonly kind = 'signed-out';
  constructor(message = 'Sign in to go on.') {
    super(message);
  }
}
export class NotAllowed extends AppError {
  readonly kind = 'forbidden';
  constructor(
    message = 'Your roles in this project do not allow this.',
    detail: ErrorDetail = {},
    readonly code = 'not-allowed',
  ) {
    super(message, detail);
  }
}
export class NotFound extends AppError {
  readonly code = 'not-found';
  readonly kind = 'missing';
  constructor(message = 'There is nothing here, or not for you.') {
    super(message);
  }
}
export class Conflict extends AppError {
  readonly kind = 'conflict';
  constructor(
    message: string,
    detail: ErrorDetail = {},
    readonly code = 'conflict',
  ) {
    super(message, detail);
  }
}
export class TooLarge extends AppError {
  readonly code = 'too-large';
  readonly kind = 'too-large';
}
/** The disk has no room for what was sent. */
export class NoRoom extends AppError {
  readonly code = 'no-room';
  readonly kind = 'no-room';
}
export class TooManyRequests extends AppError {
  readonly code = 'too-many-requests';
  readonly kind = 'too-many';
}
