import type { Browser } from 'playwright-core';
import type { BenchView } from '@shared/api/bench';
import type { KitView, StoneRow } from '@shared/api/kits';
import type { SettlementView } from '@shared/api/settlement';
import { openBrowser, openPage, paymentFakeControl, people, screenshot, signIn, startStack, waitForMail, type Stack } from '../support/e2e';
import { api, kitOf, moneyAtRest, recordedReadings } from './steps/kits';
import { handIn, openStone } from './steps/walk';
import { beginCheck, giveBack, handInOver, lend, ok } from './support-b/loans';

jest.setTimeout(420_000);

let stack: Stack;
let browser: Browser;

beforeAll(async () => {
  [stack, browser] = await Promise.all([startStack(), openBrowser()]);
});
afterAll(async () => {
  await browser.close();
  await stack.stop();
});

it('opens a stone to two people when the second reader finds the recorded one, and releases the deposit when both accept it', async () => {
  const kit = await kitOf(stack, '014');
  const jarC = jar(kit, 'C');
  const loan = await firstReadingDiffers(kit, jarC);

  const { page: second, problems } = await openPage(browser, { baseUrl: stack.url });
  await signIn(second, people.secondInstructor);
  await second.goto(`/bench/${loan}`);
  await openStone(second, jarC);
  expect(await second.getByRole('main').innerText()).not.toMatch(/topaz|glass|1\.10|1\.52/i);
  await handIn(second, jarC, recordedReadings(jarC));
  // Two readers who disagree are pooled: what stays open is no reader's finding.
  await second.getByRole('heading', { name: 'Two people decide' }).waitFor();
  await screenshot(second, 'readers-disagree-phone');
  const settlement = ok(await (await api(stack, people.admin)).get<SettlementView>(`/settlements/${loan}`));
  expect(settlement).toMatchObject({ ready: false });
  expect(settlement.stones.find((stone) => stone.stoneId === jarC.id)).toMatchObject({ ending: null, mayKeep: false });
  await keepIsRefused(loan, jarC);

  await second.getByLabel(/^Why you accept it/).fill('Weighed again with the balance levelled: it is the recorded stone.');
  await second.getByRole('button', { name: 'Accept as the recorded stone' }).click();
  await second.getByText('A second person must accept it too.').waitFor();
  expect((await kitOf(stack, '014')).place).toBe('set_aside');
  expect(await moneyAtRest(stack)).toMatchObject({ heldMinor: kit.depositMinor, keptMinor: 0 });

  const { page: first } = await openPage(browser, { baseUrl: stack.url });
  await signIn(first, people.instructor);
  await first.goto(`/bench/${loan}`);
  await openStone(first, jarC);
  await first.getByLabel(/^Why you accept it/).fill('My first weighing was of the wrong jar.');
  await first.getByRole('button', { name: 'Accept as the recorded stone' }).click();
  await waitForMail(stack, { to: people.student, subject: /Kit 014: every stone is back/, timeoutMs: 60_000 });

  const { page: student } = await openPage(browser, { baseUrl: stack.url });
  await signIn(student, people.student);
  await student.goto(`/loans/${loan}`);
  await student.getByRole('heading', { name: 'Kit 014 is back, all is well' }).waitFor();
  expect(await moneyAtRest(stack)).toMatchObject({ heldMinor: 0, chargedMinor: 0, keptMinor: 0, ledgerSumMinor: 0 });
  const [books] = await paymentFakeControl(stack).books();
  expect(books).toMatchObject({ heldMinor: 0, capturedMinor: 0, refundedMinor: 0 });
  expect(problems).toEqual([]);
});

const jar = (kit: KitView, slot: string): StoneRow => {
  const found = kit.stones.find((stone) => stone.slot === slot);
  if (found === undefined) throw new Error(`Kit ${kit.number} has no jar ${slot}.`);
  return found;
};

/** Everything up to the second reader: the first reads one jar as another stone, the others as themselves, and asks a colleague. */
async function firstReadingDiffers(kit: KitView, odd: StoneRow): Promise<string> {
  const loan = await lend(stack, kit, people.student);
  await giveBack(stack, kit, loan, people.student);
  await beginCheck(stack, kit, loan, people.instructor);
  const bench = await api(stack, people.instructor);
  for (const stone of kit.stones) {
    if (stone.id === odd.id) await handInOver(bench, loan, stone, { ...recordedReadings(stone), weight: '1.104', polariscope: 'SR' }, [1.52, 1.522]);
    else await handInOver(bench, loan, stone);
  }
  const view = ok(await bench.get<BenchView>(`/bench/${loan}`));
  expect(view.stones.find((stone) => stone.stoneId === odd.id)?.opened?.verdicts.at(-1)?.verdict).toBe('different');
  ok(await bench.post(`/bench/${loan}/stones/${odd.id}/second-reading`));
  return loan;
}

/** Money never goes ahead of two readers, even over the API. */
async function keepIsRefused(loan: string, stone: StoneRow): Promise<void> {
  const admin = await api(stack, people.admin);
  const answer = await admin.post(`/settlements/${loan}/decision`, { items: [{ stoneId: stone.id, reason: 'One reading found another stone.', amountMinor: 1000 }] });
  expect(answer.status).toBe(409);
}
