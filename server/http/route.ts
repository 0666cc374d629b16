import type { EntityManager } from 'typeorm';
import type { Database } from '@/server/database/data-source';
import { isPermission, type Permission, type Role } from '@shared/permissions';
import type { FileReply, Reply } from './reply';
import type { Services } from './services';

export type Method = 'get' | 'post' | 'put' | 'patch' | 'delete';

/** Who may call: anybody, anybody signed in, or a person whose roles in the current school hold the permission. */
export type Access = 'public' | 'signed-in' | Permission;

export interface AccountActor {
  readonly accountId: string;
}
export interface SchoolActor extends AccountActor {
  readonly schoolId: string;
  readonly roles: readonly Role[];
}
export type ActorOf<A extends Access> = A extends 'public' ? null : A extends 'signed-in' ? AccountActor : SchoolActor;

/** A class-validator class of the feature's `.dto.ts`. */
export type DtoClass<T extends object = object> = new () => T;

/** The names in a path: `ParamsOf<'/loans/:loanId/stones/:stoneId'>` is `{ loanId: string; stoneId: string }`. */
export type ParamsOf<Path extends string> = Path extends `${string}:${infer Name}/${infer Rest}`
  ? Record<Name, string> & ParamsOf<`/${Rest}`>
  : Path extends `${string}:${infer Name}`
    ? Record<Name, string>
    : object;

/** What a route answers with, named for the OpenAPI document; `R` is checked against what `handle` returns. */
export interface ResponseOf<R> {
  readonly kind: 'json' | 'nothing' | 'file';
  /** The interface of `shared/api`, or the media type of a file. */
  readonly name: string;
  /** Never set: it carries the type. */
  readonly type?: R;
}
/** `response: schema<LoanView>('LoanView')` for an interface exported by `shared/api`. */
export const schema = <R extends object>(name: string): ResponseOf<R> => ({ kind: 'json', name });
/** `response: nothing()`, answered 204. */
export const nothing = (): ResponseOf<undefined> => ({ kind: 'nothing', name: '' });
/** `response: fileOf('application/pdf')`; the handler returns `file(…)`. */
export const fileOf = (mediaType: string): ResponseOf<FileReply> => ({ kind: 'file', name: mediaType });

/** A multipart upload held in memory; the other fields of the form are the body. */
export interface UploadRule {
  readonly field: string;
  readonly maxCount: number;
  readonly maxBytes: number;
}
export interface UploadedFile {
  readonly name: string;
  readonly bytes: Buffer;
  /** What the client says it is: look into the bytes before believing it. */
  readonly claimedType: string;
}

interface Declaration<A extends Access, Path extends string, B extends object, Q extends object, R> {
  readonly method: Method;
  /** Below `/api/v1`. A name that ends in `Id` must be a UUID, else the answer is 404. */
  readonly path: Path;
  readonly permission: A;
  readonly summary: string;
  readonly request?: DtoClass<B>;
  readonly query?: DtoClass<Q>;
  readonly response: ResponseOf<R>;
  /** 200 when left out, or 204 for `nothing()`. */
  readonly status?: 200 | 201 | 202;
  /** True for every write that a phone may retry: the call then needs an `Idempotency-Key`. */
  readonly idempotent: boolean;
}

/** What every handler gets. */
export interface Context<A extends Access, Path extends string, B, Q> {
  readonly params: ParamsOf<Path>;
  readonly query: Q;
  readonly body: B;
  readonly actor: ActorOf<A>;
  readonly now: Date;
  readonly services: Services;
  readonly requestId: string;
  /** One request header, any case. */
  readonly header: (name: string) => string | undefined;
  readonly cookies: Readonly<Record<string, string>>;
  /** The caller's network address, for throttling only: never log or keep it in clear. */
  readonly address: string;
}

/** One transaction is around the handler: committed when it returns, rolled back when it throws, retried on deadlock. */
export interface TransactionContext<A extends Access, Path extends string, B, Q> extends Context<A, Path, B, Q> {
  readonly tx: EntityManager;
  /** Runs once the transaction is committed, never when it is rolled back; not kept if the process dies. Use a job for what must happen. */
  readonly afterCommit: (work: () => void | Promise<void>) => void;
}

/** No transaction: the handler opens its own units of work with `withSchool(db, actor, …)`. */
export interface FreeContext<A extends Access, Path extends string, B, Q> extends Context<A, Path, B, Q> {
  readonly db: Database;
  readonly files: readonly UploadedFile[];
  /** The untouched bytes of a route with `body: 'raw'`, else empty. */
  readonly rawBody: Buffer;
  /** The `Idempotency-Key` of an idempotent route with a hash of the request, for `claimKey` and `storeAnswer`. */
  readonly idempotency: IdempotentCall | undefined;
}

export interface IdempotentCall {
  readonly accountId: string;
  readonly operation: string;
  readonly key: string;
  readonly requestHash: Buffer;
}

type Answer<R> = R | Reply<R>;

export interface TransactionRoute<A extends Access, Path extends string, B extends object, Q extends object, R>
  extends Declaration<A, Path, B, Q, R> {
  readonly transaction?: 'one';
  readonly handle: (context: TransactionContext<A, Path, B, Q>) => Promise<Answer<R>>;
}

export interface FreeRoute<A extends Access, Path extends string, B extends object, Q extends object, R>
  extends Declaration<A, Path, B, Q, R> {
  readonly transaction: 'none';
  readonly files?: UploadRule;
  readonly body?: 'raw';
  readonly handle: (context: FreeContext<A, Path, B, Q>) => Promise<Answer<R>>;
}

/** A route as the table holds it: the types of its own handler have been checked and are no longer told apart. */
export interface AnyRoute {
  readonly method: Method;
  readonly path: string;
  readonly permission: Access;
  readonly summary: string;
  readonly request?: DtoClass | undefined;
  readonly query?: DtoClass | undefined;
  readonly response: ResponseOf<unknown>;
  readonly status: number;
  readonly idempotent: boolean;
  readonly files?: UploadRule | undefined;
  readonly rawBody: boolean;
  readonly run:
    | { readonly transaction: 'one'; readonly handle: (context: TransactionContext<Access, string, never, never>) => Promise<unknown> }
    | { readonly transaction: 'none'; readonly handle: (context: FreeContext<Access, string, never, never>) => Promise<unknown> };
}

/**
 * Declares one route. The compiler checks the handler against permission, path, DTOs and response; a declaration that
 * cannot be kept (an idempotent route without an account, say) throws when the process starts.
 */
export function route<A extends Access, const Path extends string, R, B extends object = object, Q extends object = object>(
  declared: TransactionRoute<A, Path, B, Q, R> | FreeRoute<A, Path, B, Q, R>,
): AnyRoute {
  const { method, path, permission, summary, request, query, response, idempotent } = declared;
  const name = `${method.toUpperCase()} ${path}`;
  if (permission !== 'public' && permission !== 'signed-in' && !isPermission(permission)) throw new Error(`${name}: no permission ${permission}`);
  if (idempotent && permission === 'public') throw new Error(`${name}: an idempotent route needs an account to keep the key for`);
  if (method === 'get' && (idempotent || request)) throw new Error(`${name}: a GET has no body and no key`);
  // The one place where a handler's own types are forgotten; what it is given at run time is built from the same declaration.
  const run = { transaction: declared.transaction ?? 'one', handle: declared.handle } as unknown as AnyRoute['run'];
  return {
    method, path, permission, summary, request, query, response, idempotent, run,
    status: response.kind === 'nothing' ? 204 : (declared.status ?? 200),
    files: 'files' in declared ? declared.files : undefined,
    rawBody: 'body' in declared,
  };
}

/** `POST /loans/:loanId/return`: the name of the operation in logs, idempotency keys and tests. */
export const operationOf = (declared: Pick<AnyRoute, 'method' | 'path'>): string => `${declared.method.toUpperCase()} ${declared.path}`;
