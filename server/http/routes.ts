import { depositsRoutes } from '@/server/features/deposits/deposits.routes';
import { healthRoutes } from '@/server/features/health/health.routes';
import { loansRoutes } from '@/server/features/loans/loans.routes';
import { moneyRoutes } from '@/server/features/money/money.routes';
import { peopleRoutes } from '@/server/features/people/people.routes';
import { schoolRoutes } from '@/server/features/school/school.routes';
import { sessionsRoutes } from '@/server/features/sessions/sessions.routes';
import type { AnyRoute } from './route';

/** Every route of the product. The router, the OpenAPI document and the tests that walk all routes read this one list. */
export const allRoutes: readonly AnyRoute[] = [...healthRoutes, ...sessionsRoutes, ...depositsRoutes, ...loansRoutes, ...moneyRoutes];
