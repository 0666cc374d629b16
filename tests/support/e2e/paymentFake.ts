import type { FakeControl } from '@/server/payments/fake';
import type { Stack } from './stack';

type Argument<Name extends 'addFault' | 'webhooks' | 'forge' | 'pay' | 'openDispute'> = Parameters<FakeControl[Name]>[0];
type Result<Name extends 'books' | 'deliveries' | 'pay'> = Awaited<ReturnType<FakeControl[Name]>>;

/** The switches of a running payment fake, over HTTP; see FakeControl in server/payments/fake/control for what each does. */
export function paymentFakeControl(stack: Pick<Stack, 'paymentFakeUrl'>) {
  async function call<T>(method: string, path: string, body?: object): Promise<T> {
    const answer = await fetch(`${stack.paymentFakeUrl}/_control${path}`, {
      method,
      ...(method === 'POST' ? { headers: { 'content-type': 'application/json' }, body: JSON.stringify(body ?? {}) } : {}),
    });
    if (!answer.ok) throw new Error(`The payment fake answered ${answer.status} to ${method} ${path}: ${await answer.text()}`);
    return (await answer.json()) as T;
  }
  const post = <T = unknown>(path: string, body?: object): Promise<T> => call('POST', path, body);

  return {
    reset: () => post('/reset'),
    advanceClock: (advanceSeconds: number) => post<{ nowSeconds: number }>('/clock', { advanceSeconds }),
    addFault: (fault: Argument<'addFault'>) => post('/faults', fault),
    clearFaults: () => call('DELETE', '/faults'),
    webhooks: (mode: Argument<'webhooks'>) => post('/webhooks', mode),
    releaseWebhooks: () => post('/webhooks/release'),
    webhooksIdle: () => post('/webhooks/idle'),
    deliveries: () => call<Result<'deliveries'>>('GET', '/webhooks/deliveries'),
    forge: (forgery: Argument<'forge'>) => post<{ status: number | null }>('/webhooks/forge', forgery),
    pay: (request: Argument<'pay'>) => post<Result<'pay'>>('/pay', request),
    openDispute: (target: Argument<'openDispute'>) => post<{ disputeId: string }>('/disputes', target),
    books: () => call<Result<'books'>>('GET', '/books'),
  };
}
