import { type Problem, problemSchema } from '../../../shared/contracts/problem.ts';

type ProblemFields = Omit<Problem, 'type'>;

/** A problem document (RFC 9457) as an error: what was found, what is wanted, what to do. */
export class ProblemError extends Error {
  /** HTTP status; 0 when there was no answer at all. */
  readonly status: number;
  /** Stable and machine-readable: what went wrong. */
  readonly code: string;
  readonly title: string;
  readonly detail: string | undefined;
  readonly found: string | undefined;
  readonly wanted: string | undefined;
  readonly advice: string | undefined;
  /** Refused fields: `path` is the field's name in the form, joined by dots. */
  readonly errors: { path: string; message: string }[];
  /** With 409: the version that stands on the server; parse it with the contract you expect. */
  readonly current: unknown;
  readonly retryAfterSeconds: number | undefined;

  constructor(fields: ProblemFields) {
    super(fields.detail ? `${fields.title}: ${fields.detail}` : fields.title);
    this.name = 'ProblemError';
    this.status = fields.status;
    this.code = fields.code;
    this.title = fields.title;
    this.detail = fields.detail;
    this.found = fields.found;
    this.wanted = fields.wanted;
    this.advice = fields.advice;
    this.errors = fields.errors ?? [];
    this.current = fields.current;
    this.retryAfterSeconds = fields.retryAfterSeconds;
  }
}

/** The problem a refused answer's body states; a body of another kind becomes a plain problem with its HTTP status. */
export function parseProblem(body: string, status: number): ProblemError {
  const parsed = problemSchema.safeParse(parseJson(body));
  if (parsed.success) return new ProblemError({ ...parsed.data, status });
  return new ProblemError({
    status,
    code: `http-${status}`,
    title: status >= 500 ? 'The server could not do this' : 'The server refused this',
    detail: `It answered with status ${status} and gave no reason.`,
    advice: status >= 500 ? 'Try again in a moment; if it stays, tell your site administrator.' : undefined,
  });
}

function parseJson(text: string): unknown {
  try {
    return JSON.parse(text) as unknown;
  } catch {
    return undefined;
  }
}

/** Any thrown value as a ProblemError, so that one component can show it. */
export function asProblem(error: unknown): ProblemError {
  if (error instanceof ProblemError) return error;
  return new ProblemError({
    status: 0,
    code: 'page-fault',
    title: 'This page stopped on a fault',
    detail: error instanceof Error ? error.message : String(error),
    advice: 'Reload the page. Nothing you saved is lost.',
  });
}
