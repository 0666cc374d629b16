import { randomUUID } from 'node:crypto';
import { setTimeout as pause } from 'node:timers/promises';
import type { Page as ListPage } from '@shared/api/common';
import type { KitRow, KitView, StoneRow } from '@shared/api/kits';
import type { MoneyView } from '@shared/api/money';
import type { SessionView } from '@shared/api/sessions';
import { people, type Stack } from '../../support/e2e';

export interface Answer<T> { status: number; body: T }

/** The API as a small client, signed in as one person; for what a walk needs to know beforehand or checks afterwards. */
export async function api(stack: Pick<Stack, 'url'>, email: string) {
  const call = async <T>(method: string, path: string, body?: object, token?: string): Promise<Answer<T>> => {
    const answer = await fetch(`${stack.url}/api/v1${path}`, {
      method,
      headers: {
        'content-type': 'application/json',
        'idempotency-key': randomUUID(),
        ...(token === undefined ? {} : { authorization: `Bearer ${token}` }),
      },
      ...(body === undefined ? {} : { body: JSON.stringify(body) }),
    });
    const text = await answer.text();
    return { status: answer.status, body: (text === '' ? undefined : JSON.parse(text)) as T };
  };
  const session = await call<SessionView>('POST', '/sessions', { email, password: 'crossed-polars' });
  const token = session.body.accessToken;
  return {
    get: <T>(path: string): Promise<Answer<T>> => call<T>('GET', path, undefined, token),
    post: <T>(path: string, body?: object): Promise<Answer<T>> => call<T>('POST', path, body, token),
  };
}

/** A seeded kit with its labels and records, as an admin sees it. */
export async function kitOf(stack: Pick<Stack, 'url'>, number: string): Promise<KitView> {
  const admin = await api(stack, people.admin);
  const list = await admin.get<ListPage<KitRow>>('/kits');
  const row = list.body.items.find((kit) => kit.number === number);
  if (row === undefined) throw new Error(`The demo has no kit ${number}.`);
  return (await admin.get<KitView>(`/kits/${row.id}`)).body;
}

/** The school's money once every step at the payment service is done; a mail may come a moment before its money has moved. */
export async function moneyAtRest(stack: Pick<Stack, 'url'>, timeoutMs = 60_000): Promise<MoneyView> {
  const admin = await api(stack, people.admin);
  const deadline = Date.now() + timeoutMs;
  for (;;) {
    const { body } = await admin.get<MoneyView>('/money');
    if (body.unfinishedSteps === 0) return body;
    if (Date.now() > deadline) throw new Error(`${body.unfinishedSteps} steps at the payment service are unfinished after ${timeoutMs} ms.`);
    await pause(250);
  }
}

export const codeOf = (labelled: { label: { code: string } | null }): string => {
  if (labelled.label === null) throw new Error('This has no label.');
  return labelled.label.code;
};

export interface Readings { weight: string; length: string; width: string; height: string; polariscope: string }

/** Readings that agree with a stone's record, to the resolution of a school's balance and calipers. */
export function recordedReadings(stone: StoneRow): Readings {
  const number = (attribute: string, digits: number): string => {
    const found = stone.values.find((one) => one.attribute === attribute)?.value;
    if (typeof found !== 'object' || typeof found.value !== 'number') throw new Error(`Stone ${stone.slot} has no ${attribute}.`);
    return found.value.toFixed(digits);
  };
  const reaction = stone.values.find((one) => one.attribute === 'polariscope')?.value;
  return {
    weight: number('weight_ct', 2), length: number('length_mm', 2), width: number('width_mm', 2), height: number('height_mm', 2),
    polariscope: typeof reaction === 'string' ? reaction : 'SR',
  };
}
