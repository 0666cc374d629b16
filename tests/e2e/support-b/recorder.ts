import type { Page } from 'playwright-core';

export interface Heard { url: string; body: string }

/**
 * Keeps the body of everything that reaches a page over the network: answers of the API, documents and pages elsewhere.
 * Only the app's own program, styles and fonts are left out: they are the same for everybody and hold no school's data.
 */
export async function recordNetwork(page: Page): Promise<Heard[]> {
  const heard: Heard[] = [];
  await page.context().route('**/api/v1/**', async (route) => {
    // Read here rather than afterwards: a body is gone once the page has moved on.
    const response = await route.fetch({ maxRedirects: 0 });
    heard.push({ url: `${route.request().method()} ${route.request().url()}`, body: await response.text() });
    await route.fulfill({ response });
  });
  page.on('domcontentloaded', () => {
    void page.content().then((body) => heard.push({ url: `document ${page.url()}`, body: body.replace(/<style[\s\S]*?<\/style>/g, ' ') })).catch(() => undefined);
  });
  return heard;
}
