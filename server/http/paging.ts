import { Type } from 'class-transformer';
import { IsInt, IsOptional, IsString, Max, MaxLength, Min } from 'class-validator';
import type { Page } from '@shared/api/common';
import { invalid } from './problem';

export const pageSizeDefault = 50;
export const pageSizeMax = 200;

/** `?cursor=…&limit=…` of a list; extend it with the list's own filters. */
export class PageQuery {
  @IsOptional()
  @IsString()
  @MaxLength(400)
  cursor?: string;

  @IsOptional()
  @Type(() => Number)
  @IsInt()
  @Min(1)
  @Max(pageSizeMax)
  limit?: number;
}

/** How many rows to ask for: one more than the page holds tells whether another page follows. */
export const rowsToAsk = (query: PageQuery): number => (query.limit ?? pageSizeDefault) + 1;

/**
 * The page of up to `limit` items from rows asked for with `rowsToAsk`. `keyOf` gives the values the list is sorted by,
 * ending with a unique one; they become the cursor, so that a page starts right even when rows were added before it.
 */
export function pageOf<Row, Item>(query: PageQuery, rows: readonly Row[], keyOf: (row: Row) => readonly string[], toItem: (row: Row) => Item): Page<Item> {
  const limit = query.limit ?? pageSizeDefault;
  const shown = rows.slice(0, limit);
  const last = shown.at(-1);
  const nextCursor = rows.length > limit && last !== undefined ? Buffer.from(JSON.stringify(keyOf(last))).toString('base64url') : null;
  return { items: shown.map(toItem), nextCursor };
}

/** The values a cursor stands for, `count` of them; undefined for the first page. Throws 422 for one that is not ours. */
export function cursorValues(query: PageQuery, count: number): string[] | undefined {
  if (query.cursor === undefined) return undefined;
  const values = parsed(Buffer.from(query.cursor, 'base64url').toString('utf8'));
  const fit = Array.isArray(values) && values.length === count && values.every((value): value is string => typeof value === 'string' && !value.includes('\0'));
  if (!fit) throw invalid('cursor', 'Is not a cursor of this list. Start again from the first page.');
  return values;
}

function parsed(text: string): unknown {
  try {
    return JSON.parse(text);
  } catch {
    return undefined;
  }
}
