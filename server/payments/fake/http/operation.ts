import type { Bank } from '../bank';
import type { AnyDocument } from '../documents';
import type { Params } from '../params';
import type { ListDocument } from './lists';

export interface Call {
  bank: Bank;
  /** The form body of a POST, the query of a GET. */
  params: Params;
  /** The `:id` of the path; empty where it has none. */
  id: string;
}

export interface Deleted {
  id: string;
  object: string;
  deleted: true;
}

/** One call of the API: what it is, which fields it knows, what it does. Synchronous, so calls cannot interleave. */
export interface Operation {
  method: 'delete' | 'get' | 'post';
  path: string;
  fields: readonly string[];
  run(call: Call): AnyDocument | Deleted | ListDocument;
}
