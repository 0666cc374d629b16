import type { Page } from 'playwright-core';
import type { KitView, StoneRow } from '@shared/api/kits';
import { codeOf, type Readings } from './kits';

export const goodCard = '4242424242424242';
/** Declined by the card's bank, as Stripe publishes it for tests. */
export const declinedCard = '4000000000000002';

/** Types a label's code, or lets a hand scanner do so, into the scan panel on the page. */
export async function typeCode(page: Page, code: string): Promise<void> {
  await page.getByRole('textbox', { name: 'Label code' }).fill(code);
  await page.getByRole('button', { name: 'Use this code' }).click();
}

/** From the scan page to a reserved kit. */
export async function reserve(page: Page, kit: KitView): Promise<void> {
  await page.goto('/scan');
  await typeCode(page, codeOf(kit));
  await page.getByRole('button', { name: `Take out kit ${kit.number}` }).click();
  await page.waitForURL(/\/loans\/[0-9a-f-]{36}/);
}

/** Every jar scanned in its order. */
export async function scanJars(page: Page, kit: KitView, skip = 0): Promise<void> {
  for (const [index, stone] of kit.stones.entries()) {
    if (index < skip) continue;
    await page.getByText(`${index} of ${kit.stones.length} seen`).waitFor();
    await typeCode(page, codeOf(stone));
  }
}

/** Terms accepted, on to the payment service's page. */
export async function acceptAndGoToPay(page: Page): Promise<void> {
  await page.getByRole('checkbox', { name: /I have read these terms/ }).check();
  await page.getByRole('button', { name: 'Accept and go on' }).click();
  await goToPay(page);
}

export async function goToPay(page: Page): Promise<void> {
  await page.getByRole('button', { name: /^Pay the deposit/ }).click();
  await page.locator('#card').waitFor();
}

export async function payWith(page: Page, card: string): Promise<void> {
  if (await page.locator('#email').count() > 0) await page.locator('#email').fill('somebody@portellery.example');
  await page.locator('#card').fill(card);
  await page.locator('#expiry').fill('12/34');
  await page.locator('#cvc').fill('123');
  await page.locator('#cvc').press('Enter');
}

/** The whole way out, typed and paid. */
export async function takeOut(page: Page, kit: KitView): Promise<void> {
  await reserve(page, kit);
  await scanJars(page, kit);
  await acceptAndGoToPay(page);
  await payWith(page, goodCard);
  await page.getByRole('heading', { name: new RegExp(`Kit ${kit.number} is yours until`) }).waitFor();
}

/** The whole way back, with every jar there. */
export async function bringBack(page: Page, kit: KitView): Promise<void> {
  await page.getByRole('link', { name: 'Return kit' }).click();
  await scanJars(page, kit);
  await page.getByRole('button', { name: 'Put it in the return box' }).click();
  await page.getByRole('heading', { name: `Kit ${kit.number} is in the return box` }).waitFor();
}

/** From the bench's list to a check whose kit and jars are scanned. */
export async function openCheck(page: Page, kit: KitView): Promise<void> {
  await page.goto('/bench');
  await page.getByRole('link', { name: new RegExp(kit.neutralTitle) }).click();
  await page.getByRole('heading', { name: `Scan kit ${kit.number} to begin` }).waitFor();
  await typeCode(page, codeOf(kit));
  await scanJars(page, kit);
}

/** Opens one stone of the check that the page shows. */
export async function openStone(page: Page, stone: StoneRow): Promise<void> {
  const { pathname } = new URL(page.url());
  await page.goto(`${pathname}?stone=${stone.id}`);
  await page.getByRole('heading', { level: 2, name: new RegExp(`^Jar ${stone.slot}`) }).waitFor();
}

/** Enters a first reading and hands it in; the record opens. */
export async function handIn(page: Page, stone: StoneRow, readings: Readings): Promise<void> {
  await openStone(page, stone);
  await page.getByLabel(/^Weight/).fill(readings.weight);
  await page.getByLabel(/^Length/).fill(readings.length);
  await page.getByLabel(/^Width/).fill(readings.width);
  await page.getByLabel(/^Height/).fill(readings.height);
  await page.getByRole('group', { name: 'Polariscope' }).getByText(readings.polariscope, { exact: true }).click();
  await page.getByRole('button', { name: `Hand in jar ${stone.slot}` }).click();
  await page.getByRole('heading', { name: 'Recorded and now' }).waitFor();
}
