import type { EntityManager } from 'typeorm';
import type { VerdictRequest, VerdictResponse } from '@shared/api/evidence';
import { computeVerdict, validateVerdictRequest } from '@shared/evidence';
import { BadRequest, invalid } from '@/server/http/problem';
import { refuseUnstorable } from '@/server/http/validation';
import { schoolEngineSettings } from './engineSettings';

/** Words that some programs write for a number they could not compute; JSON has none for it. They stand outside of text. */
const notNumbers = /"(?:[^"\\]|\\.)*"|-?\b(?:NaN|Infinity)\b/g;

/**
 * Reads the body of a trial. Throws `Invalid` (422) naming each field that cannot be weighed, a NaN among them, and
 * `BadRequest` (400) where the body is not JSON at all.
 */
export function parseTrial(rawBody: Buffer): VerdictRequest {
  const body = parseJson(rawBody.toString('utf8'));
  refuseUnstorable(body);
  const errors = validateVerdictRequest(body);
  if (errors.length > 0) throw invalid(errors);
  return body as VerdictRequest; // no errors: it is one
}

function parseJson(text: string): unknown {
  // A bare NaN becomes null, so that it is refused as its field's value and not as a body nobody can read.
  const readable = text.replace(notNumbers, (found) => (found.startsWith('"') ? found : 'null'));
  try {
    return JSON.parse(readable === '' ? '{}' : readable);
  } catch {
    throw new BadRequest('unreadable_body', 'The body is not valid JSON. Send a JSON object.');
  }
}

/** Weighs the readings against the record under this school's settings and stores nothing. */
export async function tryVerdict(tx: EntityManager, request: VerdictRequest): Promise<VerdictResponse> {
  return computeVerdict(request, await schoolEngineSettings(tx));
}
