import { randomUUID } from 'node:crypto';
import { makeLabelCode } from '@shared/codes';
import type { VerdictRequest } from '@shared/api/evidence';
import { computeVerdict, DEFAULT_SETTINGS } from '@shared/evidence';
import type { TestApp, TestPerson } from '@/tests/support/testApp';

/** A school in which there is one row of everything, so that every address of the table leads somewhere. */
export interface FullSchool {
  readonly schoolId: string;
  readonly everyRole: TestPerson;
  readonly student: TestPerson;
  /** A value for each name that occurs in the path of a route. */
  readonly params: Readonly<Record<string, string>>;
}

/** Words that stand in this school's rows and nowhere else: in another school's answers they would be a leak. */
export const markedWord = 'Quenlin';

const verdictRequest: VerdictRequest = {
  recorded: { species: 'topaz', shape: 'oval', values: { weight_ct: { value: 1.566, u: 0.004 } } },
  readings: [{ attribute: 'weight_ct', value: 1.565, u: 0.004 }],
};

export async function fillSchool(test: TestApp): Promise<FullSchool> {
  const schoolId = await test.school(`${markedWord} school`);
  const everyRole = await test.person(['student', 'instructor', 'admin'], schoolId, `${markedWord} Everyrole`);
  const student = await test.person(['student'], schoolId, `${markedWord} Student`);
  const insert = async (table: string, values: Record<string, unknown>): Promise<string> => {
    const id = randomUUID();
    const row: Record<string, unknown> = { id, school_id: schoolId, ...values };
    const names = Object.keys(row);
    const marks = names.map((_, index) => `$${index + 1}`);
    await test.rows(`INSERT INTO ${table} (${names.join(', ')}) VALUES (${marks.join(', ')})`, Object.values(row));
    return id;
  };
  const now = test.clock.now;
  const ago = (days: number): Date => new Date(now.getTime() - days * 24 * 3600_000);

  const kitId = await insert('kit', { number: 'QK14', title: `${markedWord} kit`, neutral_title: `${markedWord} neutral` });
  const stoneId = await insert('stone', { kit_id: kitId, slot: 'A', species: 'topaz', shape: 'oval', neutral_description: `${markedWord} oval`, replacement_value_minor: 4000 });
  const instrumentId = await insert('instrument', { kind: 'balance', name: `${markedWord} balance`, resolution: 0.01, standard_uncertainty: 0.003 });
  const code = newCode();
  await insert('label', { code, kit_id: kitId, issued_by: everyRole.accountId, issued_at: now });
  const loanId = await insert('loan', {
    kit_id: kitId, borrower_id: student.accountId, state: 'returned', reserved_at: ago(4), reserved_until: ago(3), out_at: ago(4), due_at: ago(1), returned_at: ago(1),
    deposit_minor: 8000, currency: 'EUR',
  });
  await test.rows('INSERT INTO loan_stone (school_id, loan_id, stone_id, slot, back_state) VALUES ($1, $2, $3, $4, $5)', [schoolId, loanId, stoneId, 'A', 'seen']);
  const readingId = await insert('reading', {
    stone_id: stoneId, purpose: 'intake', reader_id: everyRole.accountId, observer: 'instructor', attribute: 'weight_ct', value: 1.566, u: 0.004, instrument_id: instrumentId, taken_at: ago(9),
  });
  const photoId = await insert('photo', { stone_id: stoneId, storage_key: randomUUID(), mime: 'image/jpeg', width: 10, height: 10, created_by: everyRole.accountId });
  const result = computeVerdict(verdictRequest, DEFAULT_SETTINGS);
  const verdictId = await insert('verdict', {
    loan_id: loanId, stone_id: stoneId, basis: 'first', verdict: result.verdict, log10_lr: result.log10LR, engine: result.engine,
    settings: JSON.stringify(DEFAULT_SETTINGS), request: JSON.stringify(verdictRequest), result: JSON.stringify(result), computed_at: now,
  });
  const invitationId = await insert('invitation', {
    email: 'quenlin@example.test', roles: ['student'], token_hash: Buffer.alloc(32, 7), invited_by: everyRole.accountId, created_at: now, expires_at: ago(-14),
  });
  await insert('payment', { loan_id: loanId, mode: 'hold', state: 'held', amount_minor: 8000, currency: 'EUR', session_id: `cs_${loanId}`, payment_intent_id: `pi_${loanId}`, created_at: ago(4) });
  await insert('custody_event', { kit_id: kitId, stone_id: stoneId, loan_id: loanId, kind: 'kit_out', actor_id: student.accountId, detail: '{}', at: ago(4) });

  const params = { accountId: student.accountId, kitId, stoneId, instrumentId, loanId, readingId, photoId, verdictId, invitationId, code, token: 'A'.repeat(43) };
  return { schoolId, everyRole, student, params };
}

function newCode(): string {
  const bytes = new Uint8Array(64);
  crypto.getRandomValues(bytes);
  return makeLabelCode(bytes);
}

/** The path with its names filled in. Throws for a name nobody has thought of, so that a new kind of id is not walked past. */
export function fill(path: string, params: Readonly<Record<string, string>>): string {
  return path.replaceAll(/:(\w+)/g, (_, name: string) => {
    const value = params[name];
    if (value === undefined) throw new Error(`Give ${name} of ${path} a value in fillSchool, so that the tests that walk all routes reach it`);
    return encodeURIComponent(value);
  });
}
