import { Logger } from 'graphile-worker';
import type { Logger as Pino } from 'pino';

/**
 * The queue library's own lines, warnings and errors only, first line only. Failed jobs are left out: the library
 * would print the whole job and error, and `perform.ts` has already logged them without anything personal.
 */
export function workerLogger(log?: Pino): Logger {
  return new Logger(() => (level, message, meta) => {
    if (meta?.['failure'] === true) return;
    const severity: string = level; // the library declares an enum that does not exist at run time
    const line = message.split('\n', 1)[0] ?? '';
    if (severity === 'error') log?.error({ from: 'queue' }, line);
    else if (severity === 'warning') log?.warn({ from: 'queue' }, line);
  });
}
