import type { IntentDocument } from './documents';

export interface ApiErrorBody {
  type: 'api_error' | 'card_error' | 'idempotency_error' | 'invalid_request_error';
  message: string;
  code?: string;
  decline_code?: string;
  param?: string;
  charge?: string;
  payment_intent?: IntentDocument;
}

/** A refusal in the shape of Stripe's error documents. */
export class ApiError extends Error {
  constructor(
    readonly status: number,
    readonly body: ApiErrorBody,
  ) {
    super(body.message);
    this.name = 'ApiError';
  }
}

type Details = Omit<ApiErrorBody, 'type' | 'message'>;

export function invalidRequest(message: string, details: Details = {}): ApiError {
  return new ApiError(400, { type: 'invalid_request_error', message, ...details });
}

export function noSuch(what: string, id: string, param = 'id'): ApiError {
  return new ApiError(404, { type: 'invalid_request_error', code: 'resource_missing', param, message: `No such ${what}: '${id}'` });
}

export function unexpectedState(intent: IntentDocument, message: string): ApiError {
  return invalidRequest(message, { code: 'payment_intent_unexpected_state', payment_intent: intent });
}
