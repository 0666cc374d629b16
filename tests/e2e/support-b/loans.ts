import type { InstrumentView } from '@shared/api/instruments';
import type { KitView, ReadingEntry, StoneRow } from '@shared/api/kits';
import type { LoanView, OpenPaymentView } from '@shared/api/loans';
import { paymentFakeControl, type Stack } from '../../support/e2e';
import { api, codeOf, recordedReadings, type Answer, type Readings } from '../steps/kits';
import { goodCard } from '../steps/walk';

export type Client = Awaited<ReturnType<typeof api>>;

/** The body of an answer, or an error with what the server said. */
export function ok<T>({ status, body }: Answer<T>): T {
  if (status >= 300) throw new Error(`${status} ${JSON.stringify(body)}`);
  return body;
}

/** A kit taken out and paid over the API, for tests whose point comes later. Returns the loan's id. */
export async function lend(stack: Stack, kit: KitView, email: string): Promise<string> {
  const me = await api(stack, email);
  const loan = ok(await me.post<LoanView>('/loans', { code: codeOf(kit) }));
  for (const stone of kit.stones) ok(await me.post(`/loans/${loan.id}/jars`, { code: codeOf(stone) }));
  ok(await me.post(`/loans/${loan.id}/terms`, { termsVersionId: loan.terms.versionId }));
  const { url } = ok(await me.post<OpenPaymentView>(`/loans/${loan.id}/payment`));
  const sessionId = /cs_\w+/.exec(url ?? '')?.[0];
  if (sessionId === undefined) throw new Error(`No payment session in ${url ?? 'nothing'}.`);
  await paymentFakeControl(stack).pay({ sessionId, cardNumber: goodCard, email: 'somebody@portellery.example' });
  const { state } = ok(await me.post<LoanView>(`/loans/${loan.id}/payment/check`));
  if (state !== 'out') throw new Error(`The loan of kit ${kit.number} is ${state}, not out.`);
  return loan.id;
}

/** Every jar put into the return box. */
export async function giveBack(stack: Stack, kit: KitView, loanId: string, email: string): Promise<void> {
  const me = await api(stack, email);
  ok(await me.post(`/loans/${loanId}/return`, { stones: kit.stones.map((stone) => ({ stoneId: stone.id, state: 'seen' })) }));
}

/** The check begun: kit and jars scanned. */
export async function beginCheck(stack: Stack, kit: KitView, loanId: string, email: string): Promise<void> {
  const bench = await api(stack, email);
  ok(await bench.post(`/bench/${loanId}/opening`, { code: codeOf(kit) }));
  for (const stone of kit.stones) ok(await bench.post(`/bench/${loanId}/jars`, { code: codeOf(stone), state: 'seen' }));
}

/** A pair of spot readings of the dome goes with what the balance, the calipers and the polariscope say. */
export async function handInOver(bench: Client, loanId: string, stone: StoneRow, readings: Readings = recordedReadings(stone), spots: number[] = []): Promise<void> {
  const items = ok(await bench.get<InstrumentView[]>('/instruments'));
  const by = (kind: string): { instrumentId: string } => {
    const found = items.find((one) => one.kind === kind);
    if (found === undefined) throw new Error(`The school has no ${kind}.`);
    return { instrumentId: found.id };
  };
  const entries: ReadingEntry[] = [
    { attribute: 'weight_ct', value: Number(readings.weight), ...by('balance') },
    { attribute: 'length_mm', value: Number(readings.length), ...by('caliper') },
    { attribute: 'width_mm', value: Number(readings.width), ...by('caliper') },
    { attribute: 'height_mm', value: Number(readings.height), ...by('caliper') },
    { attribute: 'polariscope', category: readings.polariscope as 'SR' | 'DR' | 'ADR' | 'AGG' },
    ...spots.map((value) => ({ attribute: 'ri_spot' as const, value, ...by('refractometer') })),
  ];
  ok(await bench.post(`/bench/${loanId}/stones/${stone.id}/readings`, { readings: entries }));
}
