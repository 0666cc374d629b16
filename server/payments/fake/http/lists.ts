import { all, find, shown } from '../bank';
import type { Bank } from '../bank';
import type { Documents, ObjectName } from '../documents';
import { invalidRequest } from '../errors';
import { integer, isParams, text } from '../params';
import type { Params } from '../params';

export interface ListDocument {
  object: 'list';
  data: Documents[ObjectName][];
  has_more: boolean;
  url: string;
}

/** The fields that every list takes. */
export const pagingFields = ['limit', 'starting_after', 'ending_before', 'created'] as const;

interface ListRequest<N extends ObjectName> {
  name: N;
  url: string;
  params: Params;
  matches?: (document: Documents[N]) => boolean;
}

/** One page, newest first. `starting_after` pages on, `ending_before` pages back. */
export function listOf<N extends ObjectName>(bank: Bank, { name, url, params, matches = () => true }: ListRequest<N>): ListDocument {
  const limit = integer(params, 'limit') ?? 10;
  if (limit < 1 || limit > 100) throw invalidRequest('Limit must be between 1 and 100.', { param: 'limit' });
  const after = text(params, 'starting_after');
  const before = text(params, 'ending_before');
  if (after !== undefined && before !== undefined) throw invalidRequest('Give starting_after or ending_before, not both.');
  const isInRange = createdRange(params);
  const found = all(bank, name)
    .filter((document) => isInRange(document.created) && matches(document))
    .reverse();
  const positionOf = (id: string, param: string): number => {
    const cursor = find(bank, name, id, param);
    return found.findIndex((document) => document.id === cursor.id);
  };
  let page: Documents[N][];
  let hasMore: boolean;
  if (before !== undefined) {
    const end = positionOf(before, 'ending_before');
    page = found.slice(Math.max(0, end - limit), Math.max(0, end));
    hasMore = end > limit;
  } else {
    const start = after === undefined ? 0 : positionOf(after, 'starting_after') + 1;
    page = found.slice(start, start + limit);
    hasMore = found.length > start + limit;
  }
  return { object: 'list', data: page.map((document) => shown(bank, document)), has_more: hasMore, url };
}

const comparisons: Readonly<Record<string, (created: number, limit: number) => boolean>> = {
  gt: (created, limit) => created > limit,
  gte: (created, limit) => created >= limit,
  lt: (created, limit) => created < limit,
  lte: (created, limit) => created <= limit,
};

function createdRange(params: Params): (created: number) => boolean {
  const range = params.created;
  if (range === undefined) return () => true;
  if (!isParams(range)) {
    const exact = integer(params, 'created');
    return (created) => created === exact;
  }
  const tests = Object.keys(range).map((key) => {
    const compare = comparisons[key];
    const limit = integer(range, key, `created[${key}]`);
    if (compare === undefined || limit === undefined) throw invalidRequest(`Invalid created[${key}]`, { param: 'created' });
    return (created: number) => compare(created, limit);
  });
  return (created) => tests.every((test) => test(created));
}
