import { CustodyEvent } from '@/server/features/custody/custody.entity';

/** Every entity of every feature, named here so that no folder scan decides what the database holds. */
export const entities: (new () => object)[] = [CustodyEvent];
