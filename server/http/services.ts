import type { Logger } from 'pino';
import type { Config } from '@/server/config';
import type { Database } from '@/server/database/data-source';
import type { PaymentPort } from '@/server/payments/payments.port';
import type { StoragePort } from '@/server/storage/storage.port';
import type { AccessTokens } from './accessTokens';

/** What the app is built from; tests pass their own. */
export interface Dependencies {
  readonly config: Config;
  readonly db: Database;
  readonly payments: PaymentPort;
  readonly storage: StoragePort;
  readonly clock: () => Date;
  readonly logger: Logger;
}

/** What a route's handler may use beside its transaction. */
export interface Services {
  readonly config: Config;
  readonly payments: PaymentPort;
  readonly storage: StoragePort;
  readonly logger: Logger;
  readonly accessTokens: AccessTokens;
}
