import type { MailData, SchoolMailTemplate } from '@/server/mail/mailData';
import { composeAccountMail, composeSchoolMail } from '@/server/mail/templates/compose';
import { samples, schoolTemplates as templates } from '@/tests/support/mail/samples';

const context = { publicUrl: 'https://lend.portellery.example/', recipientName: 'Ida Marl', school: { name: 'Portellery School', timeZone: 'Europe/Dublin' } };
const compose = <T extends SchoolMailTemplate>(template: T, data: MailData[T] = samples[template]) => composeSchoolMail(template, data, context);
/** The words a person sees of the HTML part. */
const seen = (html: string): string => html.replace(/<style>.*?<\/style>|<title>.*?<\/title>/gs, '').replace(/<[^>]+>/g, ' ').replace(/&#39;/g, "'").replace(/&quot;/g, '"').replace(/&lt;/g, '<').replace(/&gt;/g, '>').replace(/&amp;/g, '&').replace(/\s+/g, ' ');

/** These may name a stone: a keep has been proposed, and fairness wins. */
const mayTell: readonly SchoolMailTemplate[] = ['keep-proposed', 'deposit-settled'];
const blind = templates.filter((template) => !mayTell.includes(template));

describe.each(templates)('the mail %s', (template) => {
  const mail = compose(template);

  it('says the same in text and in HTML', () => {
    const html = seen(mail.html);
    const lines = mail.text.split('\n').map((line) => line.replace(/^(- |-- )/, '').replace(/:$/, '').trim()).filter(Boolean);
    for (const line of lines) for (const part of line.split(': ')) expect(html).toContain(part);
  });

  it('has a subject of one line that fits a phone', () => {
    expect(mail.subject).not.toMatch(/[\r\n]/);
    expect(mail.subject.length).toBeLessThanOrEqual(80);
  });

  it('leads back to the app with one link and loads nothing from elsewhere', () => {
    const links = [...mail.html.matchAll(/(?:href|src)="([^"]+)"/g)].map((match) => match[1]);
    expect(links).toHaveLength(1);
    expect(links[0]).toMatch(/^https:\/\/lend\.portellery\.example\/[a-z]/);
    expect(mail.text).toContain(links[0]);
    expect(mail.html).not.toMatch(/<script|<img|url\(|@import/);
  });

  it('greets by name, is signed by the school, and reads in a dark scheme', () => {
    expect(mail.text).toContain('Hello Ida Marl');
    expect(mail.text).toMatch(/-- \nPortellery School\n$/);
    expect(mail.html).toContain('prefers-color-scheme: dark');
  });

  it('accuses nobody', () => {
    expect(mail.text).not.toMatch(/\b(you|student) (swapped|stole|replaced|exchanged|took)|theft|stolen|fraud|suspect|guilt|blame|fault|penalty|punish/i);
  });
});

describe('a mail to a borrower', () => {
  it.each(blind)('%s cannot carry a species, a reading, a verdict or the true title even where somebody puts them into its data', (template) => {
    const leaky = { species: 'topaz', title: 'Topaz and its imitations', verdict: 'different stone', reading: '1.62', figure: 'biaxial' };
    const data = { ...samples[template], ...leaky, kit: { kitNumber: '014', neutralTitle: 'six cabochons', ...leaky }, stones: [{ slot: 'A', neutralDescription: 'pale blue oval, 8×6', ...leaky }] };
    const mail = composeSchoolMail(template, data as MailData[typeof template], context);
    for (const word of Object.values(leaky)) expect(`${mail.subject}${mail.text}${mail.html}`.toLowerCase()).not.toContain(word.toLowerCase());
  });

  it('has no field for a species: the compiler refuses one', () => {
    // @ts-expect-error species is no field of a borrower's mail
    compose('kit-returned', { ...samples['kit-returned'], species: 'topaz' });
    // @ts-expect-error nor is the kit's true title
    compose('deposit-released', { loanId: 'x', kit: { kitNumber: '014', neutralTitle: 'six cabochons', title: 'Topaz' }, deposit: null });
    expect(blind).toContain('kit-returned');
  });

  it('names the stone, the reason and the way to object once a keep is proposed', () => {
    for (const template of mayTell) {
      const { text } = compose(template);
      expect(text).toContain('- Jar C, topaz, 8×6 oval: €25.00. Two readers found glass in its jar.');
      expect(text).toContain('say so on your loan’s page until Friday 18 December 2026, 17:00 (Europe/Dublin)');
    }
  });
});

describe('details', () => {
  it('says when a kit is due on the school’s clock, summer time included', () => {
    const { text, subject } = compose('loan-started', { ...samples['loan-started'], dueAt: '2026-07-03T16:00:00Z' });
    expect(subject).toBe('Kit 014 is yours until Friday 3 July');
    expect(text).toContain('Due: Friday 3 July 2026, 17:00 (Europe/Dublin)');
  });

  it('says whether the deposit is held or charged', () => {
    expect(compose('loan-started').text).toContain('Deposit held: €60.00');
    expect(compose('loan-started', { ...samples['loan-started'], deposit: { amountMinor: 6000, currency: 'JPY', mode: 'charge' } }).text).toMatch(/Deposit charged: .*6,000\n/);
    expect(compose('loan-started', { ...samples['loan-started'], deposit: null }).text).not.toMatch(/deposit/i);
  });

  it('escapes what people typed', () => {
    const mail = compose('loan-started', { ...samples['loan-started'], kit: { kitNumber: '014', neutralTitle: '<b onclick="x">&\'' } });
    expect(mail.html).toContain('&lt;b onclick=&quot;x&quot;&gt;&amp;&#39;');
    expect(mail.html).not.toContain('<b onclick');
  });

  it('lists jars in order, as people say them', () => {
    expect(compose('second-reading-wanted').text).toContain('jars A, C and E');
    expect(compose('kit-returned').text).toContain('jars A and B are damaged');
    expect(compose('kit-returned').text).toContain('jar D is missing');
  });

  it('settles without a keep in other words, and offers no objection where nothing was kept', () => {
    const { text } = compose('deposit-settled', { ...samples['deposit-settled'], kept: { amountMinor: 0, currency: 'EUR' }, released: { amountMinor: 6000, currency: 'EUR' }, items: [] });
    expect(text).toContain('Your deposit of €60.00 is released');
    expect(text).not.toContain('see it differently');
  });

  it('carries a reset link whose token survives the address', () => {
    const { text } = composeAccountMail('password-reset', { token: 'a+b/c=', expiresAt: '2026-12-01T12:30:00Z' }, { publicUrl: 'http://localhost:8080' });
    expect(text).toContain('http://localhost:8080/reset/a%2Bb%2Fc%3D');
    expect(text).toContain('until 1 December 2026, 12:30 UTC');
  });

  it('refuses a time that is none, rather than mailing "Invalid DateTime"', () => {
    expect(() => compose('kit-returned', { ...samples['kit-returned'], returnedAt: 'soon' })).toThrow(RangeError);
  });
});
