import { all, find } from './bank';
import type { Bank } from './bank';
import { settleBalance } from './objects/balance';
import { chargeOf } from './objects/charges';
import { cancelIntent } from './objects/intents';
import { failRefund, succeedRefund } from './objects/refunds';
import { expireSession } from './objects/sessions';

const keysKeptS = 86_400;

/** Lets happen what time alone brings: pages close, holds lapse, slow refunds end, money becomes available, keys are forgotten. */
export function letTimePass(bank: Bank): void {
  const nowS = bank.nowS();
  bank.request = null;
  for (const session of all(bank, 'checkout.session')) {
    if (session.status === 'open' && session.expires_at <= nowS) expireSession(bank, session);
  }
  for (const intent of all(bank, 'payment_intent')) {
    if (intent.status !== 'requires_capture') continue;
    const charge = chargeOf(bank, intent);
    const captureBeforeS = charge?.payment_method_details?.card?.capture_before;
    if (captureBeforeS !== undefined && captureBeforeS <= nowS) cancelIntent(bank, intent, charge, 'expired');
  }
  settleRefunds(bank, nowS);
  settleBalance(bank);
  const kept = Object.entries(bank.state.idempotency).filter(([, answer]) => answer.storedAtS + keysKeptS > nowS);
  bank.state.idempotency = Object.fromEntries(kept);
}

function settleRefunds(bank: Bank, nowS: number): void {
  const due = bank.state.scheduled.filter((entry) => entry.atS <= nowS);
  bank.state.scheduled = bank.state.scheduled.filter((entry) => entry.atS > nowS);
  for (const entry of due) {
    const refund = find(bank, 'refund', entry.id);
    if (entry.what === 'refund-fails') failRefund(bank, refund);
    else succeedRefund(bank, refund);
  }
}
