import { setTimeout as pause } from 'node:timers/promises';
import type { Browser, Page } from 'playwright-core';
import type { KitView } from '@shared/api/kits';
import type { CustodyEventView, LoanView, StaffLoanView } from '@shared/api/loans';
import type { MoneyView } from '@shared/api/money';
import { openBrowser, openPage, paymentFakeControl, people, readInbox, signIn, startStack, type Stack } from '../support/e2e';
import { api, kitOf } from './steps/kits';
import { acceptAndGoToPay, goodCard, payWith, reserve, scanJars } from './steps/walk';

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

it('gives the kit out once when the server is killed before the student comes back from paying', async () => {
  const kit = await kitOf(stack, '021');
  const { page, loanId } = await atThePaymentPage(people.otherStudent, kit);
  await stack.kill('server');
  await payToADeadServer(page);
  await stack.start('server');
  await page.goto(`/loans/${loanId}?payment=done`);
  await page.getByRole('heading', { name: /Kit 021 is yours until/ }).waitFor({ timeout: 60_000 });
  await expectOutOnce({ kit, loanId, email: people.otherStudent, heldMinor: kit.depositMinor });
});

it('finishes by a job when every notice is lost as well and the student never comes back', async () => {
  const heldBefore = await heldMinor();
  const kit = await kitOf(stack, '014');
  const { page, loanId } = await atThePaymentPage(people.student, kit);
  await paymentFakeControl(stack).webhooksIdle();
  await paymentFakeControl(stack).webhooks({ loseNext: 1000 });
  const delivered = (await paymentFakeControl(stack).deliveries()).length;
  await stack.kill('server');
  await payToADeadServer(page);
  await page.context().close();
  await stack.start('server');
  // The sweep runs each minute and leaves payments younger than a minute to whoever began them.
  await untilOut(loanId, 240_000);
  expect(await paymentFakeControl(stack).deliveries()).toHaveLength(delivered);
  await expectOutOnce({ kit, loanId, email: people.student, heldMinor: heldBefore + kit.depositMinor });

  const again = await openPage(browser, { baseUrl: stack.url });
  await signIn(again.page, people.student);
  await again.page.goto(`/loans/${loanId}`);
  await again.page.getByRole('heading', { name: /Kit 014 is yours until/ }).waitFor();
});

async function atThePaymentPage(email: string, kit: KitView): Promise<{ page: Page; loanId: string }> {
  const { page } = await openPage(browser, { baseUrl: stack.url });
  await signIn(page, email);
  await reserve(page, kit);
  const loanId = new URL(page.url()).pathname.split('/').at(-1) ?? '';
  await scanJars(page, kit);
  await acceptAndGoToPay(page);
  return { page, loanId };
}

/** Pays; the way back leads to an address where nobody answers. */
async function payToADeadServer(page: Page): Promise<void> {
  const before = await heldMinor();
  const refused = page.waitForEvent('requestfailed', { predicate: (request) => request.url().startsWith(stack.url), timeout: 60_000 });
  await payWith(page, goodCard);
  await refused;
  expect(await heldMinor()).toBeGreaterThan(before);
}

async function heldMinor(): Promise<number> {
  return (await paymentFakeControl(stack).books()).reduce((sum, books) => sum + books.heldMinor, 0);
}

async function untilOut(loanId: string, timeoutMs: number): Promise<void> {
  const admin = await api(stack, people.admin);
  const state = async (): Promise<string> => (await admin.get<StaffLoanView>(`/staff/loans/${loanId}`)).body.state;
  const deadline = Date.now() + timeoutMs;
  while (Date.now() < deadline && (await state()) === 'reserved') await pause(1000);
  expect(await state()).toBe('out');
}

interface Expected { kit: KitView; loanId: string; email: string; heldMinor: number }

/** One loan that is out, one custody event that says so, one hold at the payment service and in the ledger, one receipt. */
async function expectOutOnce({ kit, loanId, email, heldMinor: expected }: Expected): Promise<void> {
  // Asked for once more by the borrower and by whatever notice is still under way: nothing may happen a second time.
  const borrower = await api(stack, email);
  expect((await borrower.post<LoanView>(`/loans/${loanId}/payment/check`)).body.state).toBe('out');
  await paymentFakeControl(stack).webhooksIdle();
  const receipts = async () => (await readInbox(stack, email)).filter(({ subject }) => subject.startsWith(`Kit ${kit.number} is yours until`));
  for (let tries = 0; tries < 60 && (await receipts()).length === 0; tries += 1) await pause(500);
  await pause(3000);
  expect(await receipts()).toHaveLength(1);

  const admin = await api(stack, people.admin);
  const custody = (await admin.get<CustodyEventView[]>(`/kits/${kit.id}/custody`)).body;
  expect(custody.filter((event) => event.kind === 'kit_out').map((event) => event.loanId)).toEqual([loanId]);
  const money = (await admin.get<MoneyView>('/money')).body;
  expect(money).toMatchObject({ heldMinor: expected, chargedMinor: 0, ledgerSumMinor: 0, unfinishedSteps: 0 });
  expect(money.deposits.filter((deposit) => deposit.loanId === loanId)).toEqual([expect.objectContaining({ state: 'held', amountMinor: kit.depositMinor })]);
  expect(await heldMinor()).toBe(expected);
}
