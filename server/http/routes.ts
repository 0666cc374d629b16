import { healthRoutes } from '@/server/features/health/health.routes';
import { sessionsRoutes } from '@/server/features/sessions/sessions.routes';
import type { AnyRoute } from './route';

/** Every route of the product. The router, the OpenAPI document and the tests that walk all routes read this one list. */
export const allRoutes: readonly AnyRoute[] = [...healthRoutes, ...sessionsRoutes];
