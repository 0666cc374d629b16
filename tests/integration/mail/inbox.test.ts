import { mkdtemp, readdir, rm } from 'node:fs/promises';
import { request } from 'node:http';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { createInbox, type Inbox } from '@/server/mail/inbox/createInbox';
import type { OutgoingMail } from '@/server/mail/mail.port';
import { createSmtpMail } from '@/server/mail/smtpMail';

let inbox: Inbox;
afterEach(() => inbox.close());

const mail = (index: number, more: Partial<OutgoingMail> = {}): OutgoingMail => ({
  messageId: `<m${index}@lend.example>`, to: `student${index}@portellery.example`, subject: `Kit 0${index} is yours – until “Friday”`,
  text: `Hello.\n\nhttps://lend.example/loans/${index}\n`, html: `<html><head><title>x</title></head><body><p>Hello <a href="https://lend.example/loans/${index}">loan</a></p></body></html>`, ...more,
});

async function send(...mails: OutgoingMail[]): Promise<void> {
  const port = createSmtpMail({ smtpUrl: `smtp://127.0.0.1:${inbox.smtpPort}`, from: 'Portellery School <kits@portellery.example>' });
  await Promise.all(mails.map((each) => port.send(each)));
  await port.close();
}

const page = (address: string): Promise<Response> => fetch(`http://127.0.0.1:${inbox.httpPort}${address}`);

test('what the app sends arrives with its addressee, words and Message-ID unchanged', async () => {
  inbox = await createInbox({ smtpPort: 0, httpPort: 0 });
  await send(mail(1));
  expect(inbox.messages()).toEqual([expect.objectContaining({
    messageId: '<m1@lend.example>', to: ['student1@portellery.example'], from: '"Portellery School" <kits@portellery.example>',
    subject: 'Kit 01 is yours – until “Friday”', text: 'Hello.\n\nhttps://lend.example/loans/1\n',
  })]);
});

test('fifty mails at once all arrive, and tests can ask for one person’s', async () => {
  inbox = await createInbox({ smtpPort: 0, httpPort: 0 });
  await send(...Array.from({ length: 50 }, (_, index) => mail(index)));
  expect(await (await page('/messages.json')).json()).toHaveLength(50);
  expect(await (await page('/messages.json?to=Student7@portellery.example')).json()).toEqual([expect.objectContaining({ messageId: '<m7@lend.example>' })]);
  expect((await fetch(`http://127.0.0.1:${inbox.httpPort}/messages.json`, { method: 'DELETE' })).status).toBe(204);
  expect(inbox.messages()).toEqual([]);
});

test('mails are kept over a restart, the newest ones only', async () => {
  const dir = await mkdtemp(path.join(tmpdir(), 'trayward-inbox-'));
  inbox = await createInbox({ smtpPort: 0, httpPort: 0, dir, limit: 3 });
  for (let index = 0; index < 5; index += 1) await send(mail(index));
  await inbox.close();
  expect(await readdir(dir)).toHaveLength(3);
  inbox = await createInbox({ smtpPort: 0, httpPort: 0, dir, limit: 3 });
  expect(inbox.messages().map(({ messageId }) => messageId)).toEqual(['<m4@lend.example>', '<m3@lend.example>', '<m2@lend.example>']);
  await rm(dir, { recursive: true });
});

test('a mail’s HTML is shown in a frame that can neither run scripts nor ask for anything', async () => {
  inbox = await createInbox({ smtpPort: 0, httpPort: 0 });
  await send(mail(1, { subject: '<img src=x onerror=alert(1)>', text: '<script>alert(1)</script>' }));
  const id = inbox.messages()[0]?.id ?? '';
  const shown = await (await page(`/messages/${id}`)).text();
  expect(shown).toMatch(/<iframe[^>]* sandbox="allow-popups allow-popups-to-escape-sandbox"/);
  expect(shown).not.toContain('<img src=x');
  expect(shown).not.toContain('<script>alert');
  const framed = await page(`/messages/${id}/html`);
  expect(framed.headers.get('content-security-policy')).toMatch(/^sandbox allow-popups allow-popups-to-escape-sandbox; default-src 'none'/);
  expect(await framed.text()).toContain('<base target="_blank">');
  expect((await page('/')).headers.get('content-security-policy')).toMatch(/^default-src 'none'/);
});

test('the list says its state, and a mail that is gone says so', async () => {
  inbox = await createInbox({ smtpPort: 0, httpPort: 0 });
  expect(await (await page('/')).text()).toContain('<h1>No mail yet</h1>');
  await send(mail(1));
  expect(await (await page('/')).text()).toContain('<h1>One mail</h1>');
  expect((await page('/messages/none')).status).toBe(404);
  expect((await page('/fonts/text.ttf')).status).toBe(200);
});

test('another name that leads to this machine is not answered', async () => {
  inbox = await createInbox({ smtpPort: 0, httpPort: 0 });
  const status = await new Promise((resolve, reject) => {
    request({ host: '127.0.0.1', port: inbox.httpPort, path: '/messages.json', headers: { host: 'rebound.example' } }, (response) => {
      response.resume();
      resolve(response.statusCode);
    }).on('error', reject).end();
  });
  expect(status).toBe(421);
});

test('a port that is taken is said, not waited for', async () => {
  inbox = await createInbox({ smtpPort: 0, httpPort: 0 });
  await expect(createInbox({ smtpPort: inbox.smtpPort, httpPort: 0 })).rejects.toMatchObject({ code: 'EADDRINUSE' });
});
