import type { Browser } from 'playwright-core';
import { openBrowser, openPage, paymentFakeControl, people, screenshot, signIn, startStack, waitForMail, type Stack } from '../support/e2e';
import { kitOf, moneyAtRest } from './steps/kits';
import { acceptAndGoToPay, declinedCard, goodCard, goToPay, payWith, reserve, scanJars } from './steps/walk';

jest.setTimeout(300_000);

let stack: Stack;
let browser: Browser;

beforeAll(async () => {
  [stack, browser] = await Promise.all([startStack(), openBrowser()]);
});
afterAll(async () => {
  await browser.close();
  await stack.stop();
});

it('lets a student try another card after a decline, and come back without paying', async () => {
  const kit = await kitOf(stack, '021');
  const { page } = await openPage(browser, { baseUrl: stack.url });
  await signIn(page, people.student);
  await reserve(page, kit);
  await scanJars(page, kit);
  await acceptAndGoToPay(page);
  await page.getByRole('link', { name: 'Cancel and go back' }).click();
  await page.getByText('Not paid yet').waitFor();
  await goToPay(page);
  await payWith(page, declinedCard);
  await page.getByRole('alert').getByText('declined', { exact: false }).waitFor();
  await screenshot(page, 'declined-phone');
  await payWith(page, goodCard);
  await page.getByRole('heading', { name: /Kit 021 is yours until/ }).waitFor();
  const [books] = await paymentFakeControl(stack).books();
  expect(books?.heldMinor).toBe(kit.depositMinor);
});

it('frees a kit at once when the student cancels, so that another can take it', async () => {
  const kit = await kitOf(stack, '009');
  const { page } = await openPage(browser, { baseUrl: stack.url });
  await signIn(page, people.otherStudent);
  await reserve(page, kit);
  await page.getByRole('button', { name: 'Cancel and free the kit' }).click();
  await page.getByRole('dialog').getByRole('button', { name: 'Free the kit' }).click();
  await page.getByRole('heading', { name: 'Kit 009 was not taken out' }).waitFor();
  const other = await openPage(browser, { baseUrl: stack.url });
  await signIn(other.page, people.student);
  await reserve(other.page, kit);
});

it('cancels a payment that completes after the kit was given back, and tells the student', async () => {
  const kit = await kitOf(stack, '014');
  const { page } = await openPage(browser, { baseUrl: stack.url });
  await signIn(page, people.otherStudent);
  await reserve(page, kit);
  const loanPath = new URL(page.url()).pathname;
  await scanJars(page, kit);
  await acceptAndGoToPay(page);
  // The page's own expiry is lost on the way, as when the service is slow: the student can still pay.
  await paymentFakeControl(stack).addFault({ kind: 'dropped', path: 'expire', times: 100 });
  const admin = await openPage(browser, { baseUrl: stack.url });
  await signIn(admin.page, people.admin);
  await admin.page.goto(loanPath);
  await admin.page.getByRole('button', { name: 'Cancel and free the kit' }).click();
  await admin.page.getByRole('dialog').getByRole('button', { name: 'Free the kit' }).click();
  await expectFree('014');
  await payWith(page, goodCard);
  await waitForMail(stack, { to: people.otherStudent, subject: /Kit 014: your payment came after the booking had ended/, timeoutMs: 60_000 });
  await paymentFakeControl(stack).clearFaults();
  await page.goto(loanPath);
  await page.getByRole('heading', { name: 'Kit 014 was not taken out' }).waitFor();
  await expectFree('014');
  // Only the hold of the loan that did go out, by the first test, is left.
  const left = (await kitOf(stack, '021')).depositMinor;
  expect(await moneyAtRest(stack)).toMatchObject({ heldMinor: left, chargedMinor: 0, ledgerSumMinor: 0 });
  const books = await paymentFakeControl(stack).books();
  expect(books[0]).toMatchObject({ heldMinor: left, capturedMinor: 0 });
});

async function expectFree(number: string): Promise<void> {
  for (let tries = 0; tries < 40 && (await kitOf(stack, number)).place !== 'shelf'; tries += 1) await new Promise((resolve) => setTimeout(resolve, 250));
  expect((await kitOf(stack, number)).place).toBe('shelf');
}
