import { setTimeout as sleep } from 'node:timers/promises';

import { Router } from 'express';
import type { Request, Response } from 'express';

import { find } from '../bank';
import type { SessionDocument } from '../documents';
import { ApiError } from '../errors';
import { hit } from '../http/serve';
import type { Desk } from '../http/serve';
import { moneyText } from '../money';
import { answerBank, payOnPage, returnUrl } from '../objects/paying';
import type { PageOutcome } from '../objects/paying';
import { noteOf } from '../objects/sessions';
import { isParams } from '../params';
import { letTimePass } from '../time';
import { bankPage, messagePage, payPage } from './pages';

/** The page a student sees, the bank's step, and the receipt. Plain HTML and forms, no script. */
export function pageRoutes(desk: Desk): Router {
  const router = Router();
  const onSession = (work: (session: SessionDocument, req: Request, res: Response) => Promise<void> | void) =>
    async (req: Request, res: Response): Promise<void> => {
      res.set('Content-Security-Policy', "default-src 'none'; style-src 'unsafe-inline'; frame-ancestors 'none'; base-uri 'none'");
      res.set('Cache-Control', 'no-store');
      res.set('Referrer-Policy', 'no-referrer');
      letTimePass(desk.bank);
      const session = sessionOf(desk, String(req.params.id));
      if (session === null) res.status(404).send(messagePage('This payment page does not exist', 'Go back to the school’s page and start again.'));
      else await work(session, req, res);
    };

  router.get('/pay/:id', onSession((session, _req, res) => {
    if (session.status === 'open') res.send(payPage(session, noteOf(desk.bank, session)));
    else closed(session, res);
  }));
  router.post('/pay/:id', onSession(async (session, req, res) => {
    const outcome = pay(desk, session, fieldsOf(req));
    await settle(desk, { session, outcome, req, res });
  }));
  router.get('/pay/:id/bank', onSession((session, _req, res) => {
    const note = noteOf(desk.bank, session);
    if (session.status === 'open' && note.awaiting !== null) res.send(bankPage(session, note));
    else res.redirect(303, `/pay/${session.id}`);
  }));
  router.post('/pay/:id/bank', onSession(async (session, req, res) => {
    const outcome = answerBank(desk.bank, session, fieldsOf(req).answer === 'approve');
    await settle(desk, { session, outcome, req, res });
  }));
  router.get('/receipt/:id', (req, res) => {
    receipt(desk, req, res);
  });
  return router;
}

function sessionOf(desk: Desk, id: string): SessionDocument | null {
  try {
    return find(desk.bank, 'checkout.session', id);
  } catch (error) {
    if (error instanceof ApiError) return null;
    throw error;
  }
}

function fieldsOf(req: Request): Record<string, string> {
  const body: unknown = req.body;
  if (!isParams(body)) return {};
  return Object.fromEntries(Object.entries(body).filter((entry): entry is [string, string] => typeof entry[1] === 'string'));
}

function pay(desk: Desk, session: SessionDocument, fields: Record<string, string>): PageOutcome {
  const email = session.customer_email ?? fields.email?.trim() ?? '';
  const problem = problemOf(session, fields, email);
  if (session.status === 'open' && problem !== null) {
    noteOf(desk.bank, session).notice = problem;
    return { kind: 'declined', message: problem };
  }
  const [month = '', year = ''] = expiryOf(fields.expiry ?? '');
  return payOnPage(desk.bank, session, {
    number: fields.card ?? '',
    expMonth: Number(month),
    expYear: year.length === 2 ? 2000 + Number(year) : Number(year),
    email,
  });
}

function problemOf(session: SessionDocument, fields: Record<string, string>, email: string): string | null {
  if (session.customer_email === null && !/^[^@\s]+@[^@\s]+$/.test(email)) return 'The e-mail address is incomplete.';
  if (expiryOf(fields.expiry ?? '').length !== 2) return 'The expiry date is incomplete: month and year, as on the card.';
  if (!/^\d{3,4}$/.test((fields.cvc ?? '').trim())) return 'The security code is incomplete: three or four digits.';
  return null;
}

/** "12/34", "12 / 2034" and "1234" all mean December 2034. */
function expiryOf(typed: string): string[] {
  return /^\s*(\d{1,2})\s*[/ -]?\s*(\d{2}|\d{4})\s*$/.exec(typed)?.slice(1, 3) ?? [];
}

interface Settled {
  session: SessionDocument;
  outcome: PageOutcome;
  req: Request;
  res: Response;
}

async function settle(desk: Desk, { session, outcome, req, res }: Settled): Promise<void> {
  const faults = desk.faults.take('POST', req.originalUrl);
  await desk.save();
  const delay = hit(faults, 'delay');
  if (delay) await sleep(delay.delayMs ?? 1000);
  if (hit(faults, 'lost-answer')) req.socket.destroy();
  else if (outcome.kind === 'done') res.redirect(303, outcome.url);
  else if (outcome.kind === 'asks') res.redirect(303, `/pay/${session.id}/bank`);
  else if (outcome.kind === 'declined') res.redirect(303, `/pay/${session.id}`);
  else closed(session, res);
}

function closed(session: SessionDocument, res: Response): void {
  if (session.status === 'complete') {
    const link = { href: returnUrl(session), words: 'Go on' };
    res.send(messagePage('This is already done', 'You have finished this page before. Nothing more will be held or charged.', link));
    return;
  }
  const link = session.cancel_url === null ? null : { href: session.cancel_url, words: 'Go back' };
  res.status(410).send(messagePage('This page has expired', 'Nothing was held or charged. Go back and start again if you still want the kit.', link));
}

function receipt(desk: Desk, req: Request, res: Response): void {
  const charge = desk.bank.state.documents.charge[String(req.params.id)];
  if (charge === undefined || !charge.paid) {
    res.status(404).send(messagePage('No such receipt', 'Nothing was paid under this address.'));
    return;
  }
  const took = moneyText(charge.amount_captured, charge.currency);
  const text = charge.captured ? `${took} charged for “${charge.description ?? 'a deposit'}”.` : `${moneyText(charge.amount, charge.currency)} held, not charged.`;
  res.send(messagePage('Receipt', text));
}
