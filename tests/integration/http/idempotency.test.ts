import { randomUUID } from 'node:crypto';
import { IsInt, Max } from 'class-validator';
import supertest from 'supertest';
import { withSchool } from '@/server/database/school';
import { claimKey, storeAnswer } from '@/server/http/idempotency';
import { refused } from '@/server/http/problem';
import { reply } from '@/server/http/reply';
import { route, schema } from '@/server/http/route';
import { createTestApp, type TestApp, type TestPerson } from '@/tests/support/testApp';

class CountBody {
  @IsInt()
  @Max(1000)
  number!: number;
}

const calls = { transaction: 0, service: 0, committed: 0, cutOff: false };

/** Two routes as features write them: one transaction, and the three steps around a call to another service. */
const routes = [
  route({
    method: 'post', path: '/counts', permission: 'school:write', summary: 'Count', request: CountBody, response: schema<{ n: number }>('Money'), status: 201, idempotent: true,
    handle: async ({ tx, body, actor, afterCommit }) => {
      calls.transaction += 1;
      afterCommit(() => { calls.committed += 1; });
      await tx.query('INSERT INTO terms_version (school_id, version, text) VALUES ($1, $2, $3)', [actor.schoolId, 1000 + body.number, 'counted']);
      if (body.number === 13) throw refused('unlucky', 'Not thirteen. Take another number.');
      return { n: body.number };
    },
  }),
  route({
    method: 'post', path: '/payments', permission: 'school:write', summary: 'Pay', request: CountBody, response: schema<{ n: number }>('Money'), idempotent: true, transaction: 'none',
    handle: async ({ db, body, actor, idempotency }) => {
      if (!idempotency) throw new Error('no key');
      const before = await withSchool(db, actor, (tx) => claimKey(tx, idempotency));
      if (before && before !== 'unfinished') return reply(before.status, before.body as { n: number }, { headers: { 'Idempotency-Hit': 'true' } });
      calls.service += 1;
      if (calls.cutOff) throw new Error('cut off between payment and answer');
      return withSchool(db, actor, async (tx) => {
        const answer = { n: body.number };
        await storeAnswer(tx, idempotency, { status: 200, body: answer });
        return answer;
      });
    },
  }),
];

let test: TestApp;
let admin: TestPerson;
let colleague: TestPerson;
let schoolId: string;

beforeAll(async () => { test = await createTestApp({ routes }); });
beforeEach(async () => {
  schoolId = await test.school();
  admin = await test.person(['admin'], schoolId);
  colleague = await test.person(['admin'], schoolId);
  Object.assign(calls, { transaction: 0, service: 0, committed: 0, cutOff: false });
});
afterAll(() => test.close());

const post = (path: string, key: string | undefined, number: number, who = admin) => {
  const request = supertest(test.app).post(`/api/v1${path}`).set('Authorization', `Bearer ${who.token}`);
  return (key === undefined ? request : request.set('Idempotency-Key', key)).send({ number });
};
const counted = async (): Promise<number> => (await test.rows('SELECT 1 FROM terms_version WHERE school_id = $1 AND version > 1000', [schoolId])).length;

describe('an idempotent route', () => {
  it('needs a key of printable characters, at most 255', async () => {
    expect((await post('/counts', undefined, 1).expect(400)).body).toMatchObject({ code: 'idempotency_key_missing' });
    expect((await post('/counts', 'a b', 1).expect(400)).body).toMatchObject({ code: 'idempotency_key_unfit' });
    expect((await post('/counts', 'x'.repeat(256), 1).expect(400)).body).toMatchObject({ code: 'idempotency_key_unfit' });
    await post('/counts', 'x'.repeat(255), 1).expect(201);
  });

  it('does the work once and repeats the answer, status and all, for the same key and body', async () => {
    const key = randomUUID();
    const first = await post('/counts', key, 7).expect(201);
    const again = await post('/counts', key, 7).expect(201);
    expect(first.get('Idempotency-Hit')).toBeUndefined();
    expect(again.get('Idempotency-Hit')).toBe('true');
    expect(again.body).toEqual(first.body);
    expect([await counted(), calls.committed]).toEqual([1, 1]);
  });

  it('refuses the same key with another body', async () => {
    const key = randomUUID();
    await post('/counts', key, 7).expect(201);
    const other = await post('/counts', key, 8).expect(422);
    expect(other.body).toMatchObject({ code: 'idempotency_key_reused', errors: [{ field: 'Idempotency-Key' }] });
    expect(await counted()).toBe(1);
  });

  it('keeps the keys of two people apart', async () => {
    const key = randomUUID();
    await post('/counts', key, 7).expect(201);
    await post('/counts', key, 8, colleague).expect(201);
    expect(await counted()).toBe(2);
  });

  it('does the work once when twenty retries come at the same moment', async () => {
    const key = randomUUID();
    const answers = await Promise.all(Array.from({ length: 20 }, () => post('/counts', key, 7)));
    expect(answers.map((answer) => answer.status)).toEqual(Array.from({ length: 20 }, () => 201));
    expect(answers.filter((answer) => answer.get('Idempotency-Hit') === undefined)).toHaveLength(1);
    expect(await counted()).toBe(1);
  });

  it('keeps nothing of a refusal, neither work nor key, so that the next try is a real one', async () => {
    const key = randomUUID();
    expect((await post('/counts', key, 13).expect(409)).body).toMatchObject({ code: 'unlucky' });
    expect((await post('/counts', key, 13).expect(409)).get('Idempotency-Hit')).toBeUndefined();
    expect([await counted(), calls.transaction, calls.committed]).toEqual([0, 2, 0]);
    await post('/counts', key, 14).expect(201);
  });

  it('answers a unique clash that another request caused with 409, not 500', async () => {
    await post('/counts', randomUUID(), 7).expect(201);
    expect((await post('/counts', randomUUID(), 7).expect(409)).body).toMatchObject({ code: 'already_exists' });
  });
});

describe('the three-step form', () => {
  it('replays a finished call without asking the service again', async () => {
    const key = randomUUID();
    await post('/payments', key, 7).expect(200);
    const again = await post('/payments', key, 7).expect(200);
    expect(again.get('Idempotency-Hit')).toBe('true');
    expect([again.body, calls.service]).toEqual([{ n: 7 }, 1]);
  });

  it('goes on from its intent when an earlier try was cut off after the call', async () => {
    const key = randomUUID();
    calls.cutOff = true;
    const failed = await post('/payments', key, 7).expect(500);
    expect(failed.body).toMatchObject({ code: 'internal' });
    expect(failed.text).not.toContain('cut off');
    calls.cutOff = false;
    await post('/payments', key, 7).expect(200);
    expect((await post('/payments', key, 8).expect(422)).body).toMatchObject({ code: 'idempotency_key_reused' });
    expect(calls.service).toBe(2);
  });
});
