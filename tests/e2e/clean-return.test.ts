import type { Browser } from 'playwright-core';
import { labelImage } from '../support/labelImage';
import { makeCameraFeed, openBrowser, openPage, paymentFakeControl, people, screenshot, signIn, startStack, waitForMail, type Stack } from '../support/e2e';
import { codeOf, kitOf, moneyAtRest, recordedReadings } from './steps/kits';
import { acceptAndGoToPay, bringBack, goodCard, handIn, openCheck, payWith, reserve, scanJars } from './steps/walk';

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

it.each([['phone', '014'], ['wide', '009']] as const)('lends a kit, takes it back and releases the deposit when every stone is the same (%s)', async (size, number) => {
  const kit = await kitOf(stack, number);
  const student = await openPage(browser, { baseUrl: stack.url, size });
  await signIn(student.page, people.student);
  await reserve(student.page, kit);
  await screenshot(student.page, `take-out-${size}`);
  await scanJars(student.page, kit);
  await acceptAndGoToPay(student.page);
  await screenshot(student.page, `payment-page-${size}`);
  await payWith(student.page, goodCard);
  await student.page.getByRole('heading', { name: new RegExp(`Kit ${number} is yours until`) }).waitFor();
  await screenshot(student.page, `yours-${size}`);
  await waitForMail(stack, { to: people.student, subject: new RegExp(`Kit ${number}`) });
  await bringBack(student.page, kit);
  await screenshot(student.page, `returned-${size}`);

  const instructor = await openPage(browser, { baseUrl: stack.url, size });
  await signIn(instructor.page, people.instructor);
  await openCheck(instructor.page, kit);
  for (const stone of kit.stones) {
    await handIn(instructor.page, stone, recordedReadings(stone));
    await instructor.page.getByText('Same stone', { exact: true }).first().waitFor();
  }
  await screenshot(instructor.page, `verdict-same-${size}`);
  await waitForMail(stack, { to: people.student, subject: new RegExp(`Kit ${number}: every stone is back`) });

  await student.page.reload();
  await student.page.getByRole('heading', { name: `Kit ${number} is back, all is well` }).waitFor();
  expect((await kitOf(stack, number)).place).toBe('shelf');
  expect(await moneyAtRest(stack)).toMatchObject({ heldMinor: 0, chargedMinor: 0, keptMinor: 0, ledgerSumMinor: 0 });
  const [books] = await paymentFakeControl(stack).books();
  expect(books).toMatchObject({ heldMinor: 0, capturedMinor: 0, refundedMinor: 0 });
  expect([...student.problems, ...instructor.problems]).toEqual([]);
  await Promise.all([student.page.context().close(), instructor.page.context().close()]);
});

it('reads the printed labels of the kit and its first jar from a camera', async () => {
  const kit = await kitOf(stack, '021');
  const [first] = kit.stones;
  if (first === undefined) throw new Error('Kit 021 has no stones.');
  const pictures = await Promise.all([
    labelImage({ code: codeOf(kit), kitNumber: kit.number, publicUrl: stack.url }),
    labelImage({ code: codeOf(first), kitNumber: kit.number, slot: first.slot, publicUrl: stack.url }),
  ]);
  const camera = await makeCameraFeed(pictures.map((source) => ({ source })), 4);
  const seeing = await openBrowser({ camera });
  try {
    const { page, problems } = await openPage(seeing, { baseUrl: stack.url });
    await signIn(page, people.otherStudent);
    await page.goto('/scan');
    await page.getByRole('button', { name: 'Take out kit 021' }).click({ timeout: 60_000 });
    await page.waitForURL(/\/loans\/[0-9a-f-]{36}/);
    await page.getByRole('button', { name: 'Scan with the camera' }).click();
    await page.getByText(`1 of ${kit.stones.length} seen`).waitFor({ timeout: 60_000 });
    await screenshot(page, 'camera-phone');
    await page.getByRole('button', { name: 'Close the camera' }).click();
    await page.getByRole('button', { name: 'Scan with the camera' }).waitFor();
    expect(problems).toEqual([]);
  } finally {
    await seeing.close();
  }
});
