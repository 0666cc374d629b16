import type { Browser } from 'playwright-core';
import { openBrowser, openPage, paymentFakeControl, people, readInbox, screenshot, settled, signIn, startStack, type Stack } from '../support/e2e';

// What the other end-to-end tests stand on; when one of these fails, look here before anywhere else.
jest.setTimeout(180_000);

let stack: Stack;
let browser: Browser;

beforeAll(async () => {
  [stack, browser] = await Promise.all([startStack(), openBrowser()]);
});

afterAll(async () => {
  await browser.close();
  await stack.stop();
});

it('serves the web app, which shows the sign-in page on a phone and on a wide screen without an error', async () => {
  for (const size of ['phone', 'wide'] as const) {
    const { page, problems } = await openPage(browser, { baseUrl: stack.url, size });
    await page.goto('/');
    await page.getByLabel(/password/i).waitFor();
    await screenshot(page, `sign-in-${size}`);
    expect(problems).toEqual([]);
    await page.context().close();
  }
});

it('lets each of the demo people in, without an error on their first screen', async () => {
  for (const [who, email] of Object.entries(people)) {
    const { page, problems } = await openPage(browser, { baseUrl: stack.url });
    await signIn(page, email);
    await settled(page);
    await screenshot(page, `first-screen-${who}`);
    expect({ who, problems }).toEqual({ who, problems: [] });
    await page.context().close();
  }
});

it('knows the demo people still after the server was killed', async () => {
  const signIn = (): Promise<Response> =>
    fetch(`${stack.url}/api/v1/sessions`, {
      method: 'POST',
      headers: { 'content-type': 'application/json' },
      body: JSON.stringify({ email: 'student@portellery.example', password: 'crossed-polars' }),
    });
  expect((await signIn()).status).toBe(201);
  await stack.restartServer();
  expect((await signIn()).status).toBe(201);
});

it('has a mail inbox and a payment fake of its own', async () => {
  expect(await readInbox(stack)).toEqual([]);
  expect(await paymentFakeControl(stack).deliveries()).toEqual([]);
});
