import { find, shown } from '../bank';
import type { Bank } from '../bank';
import type { ObjectName } from '../documents';
import { invalidRequest } from '../errors';
import { list } from '../params';
import type { Params } from '../params';

/** Which fields hold the id of which object. */
const links: Readonly<Record<string, ObjectName>> = {
  balance_transaction: 'balance_transaction',
  charge: 'charge',
  customer: 'customer',
  latest_charge: 'charge',
  payment_intent: 'payment_intent',
  payment_method: 'payment_method',
  setup_intent: 'setup_intent',
};
/** The source of a line of the balance may be any of these; its id tells which. */
const sources: Readonly<Record<string, ObjectName>> = { ch: 'charge', re: 'refund', du: 'dispute' };
const deepest = 4;

type Answer = Record<string, unknown>;

function isAnswer(value: unknown): value is Answer {
  return typeof value === 'object' && value !== null && !Array.isArray(value);
}

/** Replaces the ids named by `expand[]` by their objects, in place. */
export function expand(bank: Bank, answer: unknown, params: Params): void {
  for (const path of list(params, 'expand')) {
    const steps = typeof path === 'string' ? path.split('.') : [];
    if (steps.length === 0 || steps.length > deepest || !follow(bank, answer, steps)) {
      throw invalidRequest(`This property cannot be expanded (${String(path)}).`, { param: 'expand' });
    }
  }
}

/** @returns false when the path leads nowhere an object could be */
function follow(bank: Bank, node: unknown, [step, ...rest]: readonly string[]): boolean {
  if (step === undefined) return true;
  if (step === 'data' && isAnswer(node) && Array.isArray(node.data)) {
    return node.data.every((item) => follow(bank, item, rest));
  }
  if (!isAnswer(node) || !(step in node)) return false;
  const linked = node[step];
  if (linked === null) return true;
  if (typeof linked === 'string') {
    const name = step === 'source' ? sources[linked.split('_')[0] ?? ''] : links[step];
    if (name === undefined) return false;
    node[step] = shown(bank, find(bank, name, linked));
  }
  return follow(bank, node[step], rest);
}
