/** One refused field of a request: `items[0].amountMinor` and what is wrong with it, in words for people. */
export interface FieldError {
  field: string;
  message: string;
}

interface ProblemInit {
  status: number;
  title: string;
  code: string;
  detail: string;
  errors?: readonly FieldError[] | undefined;
  headers?: Readonly<Record<string, string>> | undefined;
}

/**
 * A refusal the client is told about, answered as a problem document (RFC 9457). `code` is for machines and never
 * changes once published; `detail` is for people and ends with the next step. Throwing one rolls the unit of work back.
 */
export class Problem extends Error {
  readonly status: number;
  readonly title: string;
  readonly code: string;
  readonly errors: readonly FieldError[];
  readonly headers: Readonly<Record<string, string>>;

  constructor(init: ProblemInit) {
    super(init.detail);
    this.name = new.target.name;
    this.status = init.status;
    this.title = init.title;
    this.code = init.code;
    this.errors = init.errors ?? [];
    this.headers = init.headers ?? {};
  }
}

/** 400: the request itself is malformed, before any field is looked at. */
export class BadRequest extends Problem {
  constructor(code: string, detail: string) {
    super({ status: 400, title: 'The request could not be read', code, detail });
  }
}

/** 401: nobody is signed in, or the sign-in has run out. */
export class SignInNeeded extends Problem {
  constructor(detail = 'Sign in and try again.', code = 'sign_in_needed') {
    super({ status: 401, title: 'Sign in first', code, detail, headers: { 'WWW-Authenticate': 'Bearer' } });
  }
}

/** 403: signed in, but not allowed this. */
export class Forbidden extends Problem {
  constructor(detail = 'Your role in this school does not include this. Ask an admin of the school.', code = 'forbidden') {
    super({ status: 403, title: 'Not allowed', code, detail });
  }
}

/** 404: no such thing, or none that this person may know of. */
export class NotFound extends Problem {
  constructor(detail = 'There is nothing here. Check the address and try again.', code = 'not_found') {
    super({ status: 404, title: 'Not found', code, detail });
  }
}

/** 409: understood, but the state of things does not allow it; `detail` says what would be allowed. */
export class Refused extends Problem {
  constructor(code: string, detail: string, errors?: readonly FieldError[]) {
    super({ status: 409, title: 'Not possible as things stand', code, detail, errors });
  }
}

/** 422: one or more fields are wrong; each is named. */
export class Invalid extends Problem {
  constructor(errors: readonly FieldError[], code = 'invalid', detail = 'Correct the fields named and send it again.') {
    super({ status: 422, title: 'Some fields need correcting', code, detail, errors });
  }
}

/** 429: too often; `Retry-After` says when. */
export class TooMany extends Problem {
  constructor(retryAfterSeconds: number, detail = 'That was tried too often. Wait a little and try again.', code = 'too_many') {
    const seconds = String(Math.max(1, Math.ceil(retryAfterSeconds)));
    super({ status: 429, title: 'Too many tries', code, detail, headers: { 'Retry-After': seconds } });
  }
}

/** 503: something this request needs does not answer just now. */
export class Unavailable extends Problem {
  constructor(code: string, detail: string, retryAfterSeconds = 5) {
    super({ status: 503, title: 'Not available just now', code, detail, headers: { 'Retry-After': String(retryAfterSeconds) } });
  }
}

/** `throw notFound('That kit is not in this school.')` */
export const notFound = (detail?: string, code?: string): NotFound => new NotFound(detail, code);
/** `throw refused('kit_is_out', 'Kit 014 is out until 4 May. Pick another kit.')` */
export const refused = (code: string, detail: string, errors?: readonly FieldError[]): Refused => new Refused(code, detail, errors);
/** `throw invalid('amountMinor', 'Keep at most the deposit, 8000.')`, or a list of fields. */
export function invalid(field: string | readonly FieldError[], message = '', code?: string): Invalid {
  return new Invalid(typeof field === 'string' ? [{ field, message }] : field, code);
}
/** `throw forbidden('You are the borrower of this loan. A colleague checks it.', 'own_loan')` */
export const forbidden = (detail?: string, code?: string): Forbidden => new Forbidden(detail, code);
export const signInNeeded = (detail?: string, code?: string): SignInNeeded => new SignInNeeded(detail, code);
export const tooMany = (retryAfterSeconds: number, detail?: string, code?: string): TooMany =>
  new TooMany(retryAfterSeconds, detail, code);
