import { benchRoutes } from '@/server/features/bench/bench.routes';
import { depositsRoutes } from '@/server/features/deposits/deposits.routes';
import { deskRoutes } from '@/server/features/desk/desk.routes';
import { healthRoutes } from '@/server/features/health/health.routes';
import { instrumentsRoutes } from '@/server/features/instruments/instruments.routes';
import { kitsRoutes } from '@/server/features/kits/kits.routes';
import { labelsRoutes } from '@/server/features/labels/labels.routes';
import { loansRoutes } from '@/server/features/loans/loans.routes';
import { moneyRoutes } from '@/server/features/money/money.routes';
import { peopleRoutes } from '@/server/features/people/people.routes';
import { photosRoutes } from '@/server/features/photos/photos.routes';
import { schoolRoutes } from '@/server/features/school/school.routes';
import { sessionsRoutes } from '@/server/features/sessions/sessions.routes';
import { settlementRoutes } from '@/server/features/settlement/settlement.routes';
import { speciesRoutes } from '@/server/features/species/species.routes';
import { stonesRoutes } from '@/server/features/stones/stones.routes';
import { verdictsRoutes } from '@/server/features/verdicts/verdicts.routes';
import type { AnyRoute } from './route';

/** Every route of the product. The router, the OpenAPI document and the tests that walk all routes read this one list. */
export const allRoutes: readonly AnyRoute[] = [
  ...healthRoutes, ...sessionsRoutes, ...peopleRoutes, ...schoolRoutes, ...depositsRoutes, ...loansRoutes,
  ...moneyRoutes, ...instrumentsRoutes, ...kitsRoutes, ...labelsRoutes, ...photosRoutes, ...speciesRoutes, ...stonesRoutes, ...verdictsRoutes,
  ...benchRoutes, ...settlementRoutes, ...deskRoutes,
];
