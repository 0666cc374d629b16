import type { Browser } from 'playwright-core';
import { openBrowser, openPage, paymentFakeControl, people, signIn, startStack, waitForMail, type Stack } from '../support/e2e';
import { codeOf, kitOf, moneyAtRest, recordedReadings } from './steps/kits';
import { handIn, reserve, takeOut, typeCode } from './steps/walk';

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

it('stops a take-out when a jar is not in the kit, and keeps the kit for an admin to look at', async () => {
  const kit = await kitOf(stack, '009');
  const { page } = await openPage(browser, { baseUrl: stack.url });
  await signIn(page, people.otherStudent);
  await reserve(page, kit);
  await page.getByRole('button', { name: 'Jar A is not there' }).click();
  await page.getByRole('dialog').getByRole('button', { name: 'It is not there: stop' }).click();
  await page.getByRole('heading', { name: 'Kit 009 was not taken out' }).waitFor();
  expect((await kitOf(stack, '009')).place).toBe('set_aside');
  await waitForMail(stack, { to: people.admin, subject: /Kit 009 is set aside: jar A not there/ });
});

it('lets the admin settle a jar that came back empty, with a reason, and keep part of the deposit', async () => {
  const kit = await kitOf(stack, '021');
  const [gone, ...here] = kit.stones;
  if (gone === undefined) throw new Error('Kit 021 has no stones.');
  const { page: student } = await openPage(browser, { baseUrl: stack.url });
  await signIn(student, people.student);
  await takeOut(student, kit);
  const loanPath = new URL(student.url()).pathname;
  await student.getByRole('link', { name: 'Return kit' }).click();
  await student.getByRole('button', { name: `Something is wrong with jar ${gone.slot}` }).click();
  await student.getByRole('dialog').getByText('Missing', { exact: true }).click();
  await student.getByRole('dialog').getByRole('button', { name: 'Save' }).click();
  for (const [index, stone] of here.entries()) {
    await student.getByText(`${index + 1} of ${kit.stones.length} seen`).waitFor();
    await typeCode(student, codeOf(stone));
  }
  await student.getByRole('button', { name: 'Put it in the return box' }).click();
  await student.getByRole('heading', { name: 'Kit 021 is in the return box' }).waitFor();

  const { page: instructor } = await openPage(browser, { baseUrl: stack.url });
  await signIn(instructor, people.instructor);
  await instructor.goto(loanPath.replace('/loans/', '/bench/'));
  await typeCode(instructor, codeOf(kit));
  await instructor.getByRole('button', { name: `Note what you find of jar ${gone.slot}` }).click();
  await instructor.getByRole('dialog').getByRole('button', { name: 'Save' }).click();
  for (const [index, stone] of here.entries()) {
    await instructor.getByText(`${index + 1} of ${kit.stones.length} seen`).waitFor();
    await typeCode(instructor, codeOf(stone));
  }
  for (const stone of here) await handIn(instructor, stone, recordedReadings(stone));

  const { page: admin } = await openPage(browser, { baseUrl: stack.url, size: 'wide' });
  await signIn(admin, people.admin);
  await admin.goto(`${loanPath.replace('/loans/', '/bench/')}?stone=${gone.id}`);
  await admin.getByRole('button', { name: 'Settle as missing' }).click();
  await admin.getByRole('dialog').getByLabel(/^Reason/).fill('The jar came back empty and the stone was not found.');
  await admin.getByRole('dialog').getByRole('button', { name: 'Settle this stone' }).click();
  await admin.getByText('missing', { exact: true }).first().waitFor();
  await admin.goto(loanPath);
  await admin.getByLabel(`Jar ${gone.slot}: keep, EUR`).fill('20');
  await admin.getByRole('button', { name: 'Keep €20.00' }).click();
  await admin.getByRole('dialog').getByRole('button', { name: 'Decide' }).click();
  await admin.getByText('Deposit decided').waitFor();
  await student.reload();
  await student.getByRole('heading', { name: 'What was kept, and why' }).waitFor();
  await waitForMail(stack, { to: people.student, subject: /Kit 021: your deposit is settled/, timeoutMs: 60_000 });
  expect(await moneyAtRest(stack)).toMatchObject({ heldMinor: 0, chargedMinor: 0, keptMinor: 2000, ledgerSumMinor: 0 });
  const [books] = await paymentFakeControl(stack).books();
  expect(books).toMatchObject({ heldMinor: 0, capturedMinor: 2000, refundedMinor: 0 });
});
