import type { Browser, Page } from 'playwright-core';
import type { KitRow, KitView } from '@shared/api/kits';
import type { Page as ListPage } from '@shared/api/common';
import { openBrowser, openPage, people, readInbox, signIn, startStack, waitForMail, type Stack } from '../support/e2e';
import { api, kitOf, recordedReadings } from './steps/kits';
import { acceptAndGoToPay, bringBack, goodCard, payWith, reserve, scanJars } from './steps/walk';
import { beginCheck, handInOver } from './support-b/loans';
import { recordNetwork, type Heard } from './support-b/recorder';
import { detectorFor, type Detector } from './support-b/secrets';

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

it('tells a student nothing of a kit’s stones, on any page, in any answer or mail, from take-out to release', async () => {
  const kit = await kitOf(stack, '014');
  const secretsIn = await detectorFor(await api(stack, people.admin), kit);
  await expectDetectorSees(secretsIn, kit);
  const { page, loanId, heard } = await borrowAndReturn(people.student, kit, secretsIn);

  await beginCheck(stack, kit, loanId, people.instructor);
  await page.goto(`/loans/${loanId}`);
  await page.getByRole('heading', { level: 1 }).waitFor();
  const bench = await api(stack, people.instructor);
  for (const stone of kit.stones) await handInOver(bench, loanId, stone, recordedReadings(stone));
  await waitForMail(stack, { to: people.student, subject: /Kit 014: every stone is back/, timeoutMs: 60_000 });
  await page.goto(`/loans/${loanId}`);
  await page.getByRole('heading', { name: 'Kit 014 is back, all is well' }).waitFor();
  for (const path of ['/borrow', '/loans']) {
    await page.goto(path);
    await page.getByRole('heading', { level: 1 }).waitFor();
  }
  await expectBlind(people.student, heard, secretsIn);
});

it('is as blind to an instructor who borrows, who can open neither the check, nor the kit, nor its stones', async () => {
  const kit = await kitOf(stack, '009');
  const admin = await api(stack, people.admin);
  const secretsIn = await detectorFor(admin, kit);
  await expectDetectorSees(secretsIn, kit);
  const { page, loanId, heard } = await borrowAndReturn(people.instructor, kit, secretsIn);
  await expectBlind(people.instructor, heard, secretsIn);

  for (const path of [`/bench/${loanId}`, `/kits/${kit.id}`, ...kit.stones.map((stone) => `/stones/${stone.id}`)]) {
    await page.goto(path);
    await page.getByRole('alert').first().waitFor();
    expect({ path, gives: secretsIn(await page.getByRole('main').innerText()) }).toEqual({ path, gives: [] });
  }
  await page.goto('/bench');
  await page.getByRole('heading', { level: 1 }).waitFor();
  const me = await api(stack, people.instructor);
  for (const path of [`/bench/${loanId}`, `/kits/${kit.id}`, `/kits/${kit.id}/custody`, `/staff/loans/${loanId}`, ...kit.stones.flatMap(({ id }) => [`/stones/${id}`, `/stones/${id}/custody`])]) {
    const answer = await me.get<object>(path);
    expect({ path, status: answer.status, gives: secretsIn(JSON.stringify(answer.body)) }).toEqual({ path, status: 403, gives: [] });
  }
  const own = (await me.get<ListPage<KitRow>>('/kits')).body.items.find((row) => row.id === kit.id);
  expect(secretsIn(JSON.stringify(own))).toEqual([]);
  const read = await me.post(`/bench/${loanId}/opening`, { code: kit.label?.code });
  expect(read.status).toBe(403);
  await expectBlind(people.instructor, heard, secretsIn);
});

/** The whole loan up to the return box through the screens, all that the page hears kept. */
async function borrowAndReturn(email: string, kit: KitView, secretsIn: Detector): Promise<{ page: Page; loanId: string; heard: Heard[] }> {
  const { page } = await openPage(browser, { baseUrl: stack.url });
  const heard = await recordNetwork(page);
  await signIn(page, email);
  await reserve(page, kit);
  const loanId = new URL(page.url()).pathname.split('/').at(-1) ?? '';
  await scanJars(page, kit);
  await acceptAndGoToPay(page);
  const paymentPage = await page.locator('body').innerText();
  expect(paymentPage).toContain(`kit ${kit.number}`);
  expect(secretsIn(paymentPage)).toEqual([]);
  await payWith(page, goodCard);
  await page.getByRole('heading', { name: new RegExp(`Kit ${kit.number} is yours until`) }).waitFor();
  await bringBack(page, kit);
  await waitForMail(stack, { to: email, subject: new RegExp(`Kit ${kit.number} .*(return|back)`, 'i') });
  return { page, loanId, heard };
}

async function expectBlind(email: string, heard: readonly Heard[], secretsIn: Detector): Promise<void> {
  expect(heard.filter(({ url }) => url.includes('/api/v1/loans')).length).toBeGreaterThan(10);
  expect(heard.filter(({ body }) => secretsIn(body).length > 0).map(({ url, body }) => ({ url, gives: secretsIn(body) }))).toEqual([]);
  const mails = await readInbox(stack, email);
  expect(mails.length).toBeGreaterThanOrEqual(2);
  for (const mail of mails) expect({ subject: mail.subject, gives: secretsIn(`${mail.subject} ${mail.text} ${mail.html}`) }).toEqual({ subject: mail.subject, gives: [] });
}

/** A detector that finds nothing proves nothing: it must see each stone in what an admin is told. */
async function expectDetectorSees(secretsIn: Detector, kit: KitView): Promise<void> {
  expect(secretsIn(kit.title)).toContain(kit.title);
  const admin = await api(stack, people.admin);
  for (const stone of kit.stones) {
    const found = secretsIn(JSON.stringify((await admin.get<object>(`/stones/${stone.id}`)).body));
    expect(found).toEqual(expect.arrayContaining([stone.species, 'weight_ct']));
    expect(found.some((what) => /^\d+\.\d\d/.test(what))).toBe(true);
  }
}
