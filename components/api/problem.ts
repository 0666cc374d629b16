import type { ProblemDocument } from '@shared/api/common';

/** A refusal by the server, as its problem document says it. */
export class ApiProblem extends Error {
  readonly status: number;
  /** For machines: what a screen may branch on. */
  readonly code: string;
  readonly title: string;
  /** For people; ends with the next step. */
  readonly detail: string;
  readonly errors: readonly { field: string; message: string }[];
  readonly requestId: string | null;

  constructor(status: number, document: Partial<ProblemDocument> = {}) {
    super(document.detail ?? document.title ?? `The server answered ${status}`);
    this.name = 'ApiProblem';
    this.status = status;
    this.code = document.code ?? `http_${status}`;
    this.title = document.title ?? defaultTitle(status);
    this.detail = document.detail ?? defaultDetail(status);
    this.errors = document.errors ?? [];
    this.requestId = document.requestId ?? null;
  }

  /** What is wrong with one field of the request, if anything. */
  fieldError(field: string): string | undefined {
    return this.errors.find((error) => error.field === field)?.message;
  }
}

/** No answer came: no network, a server that is down, or a request cut off. */
export class NoAnswer extends Error {
  constructor(cause: unknown) {
    super('No answer came from the server', { cause });
    this.name = 'NoAnswer';
  }
}

/** True when trying the same request again may succeed: no answer, or an answer that is not about the request. */
export function isTransient(error: unknown): boolean {
  if (error instanceof NoAnswer) return true;
  return error instanceof ApiProblem && (error.status >= 500 || error.status === 408 || error.status === 425 || error.status === 429);
}

/** What is wrong with one field, from whatever was thrown. */
export function fieldError(error: unknown, field: string): string | undefined {
  return error instanceof ApiProblem ? error.fieldError(field) : undefined;
}

function defaultTitle(status: number): string {
  if (status === 404) return 'Not found';
  if (status === 403) return 'Not yours to open';
  return status >= 500 ? 'Something broke on our side' : 'That did not work';
}

function defaultDetail(status: number): string {
  if (status === 404) return 'It may have been removed, or the address is mistyped. Go back and pick it from a list.';
  if (status === 403) return 'Your role in this school does not open it. Ask an admin of your school.';
  if (status >= 500) return 'Nothing you entered was lost. Try again in a moment.';
  return 'Check what you entered and try again.';
}
