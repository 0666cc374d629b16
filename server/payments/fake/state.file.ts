import { existsSync, readFileSync } from 'node:fs';
import { mkdir, open, rename } from 'node:fs/promises';
import path from 'node:path';

import { emptyState } from './state';
import type { State } from './state';

export interface StateFile {
  read(): State;
  /** Resolves when all that was in the state at the time of the call is on disk. */
  write(state: State): Promise<void>;
}

/** For tests: nothing outlives the process. */
export const noStateFile: StateFile = { read: emptyState, write: () => Promise.resolve() };

/**
 * Keeps the state in one JSON file, replaced as a whole (written beside it, flushed, renamed), so that a reader or
 * a killed process never sees half of it. Calls that come during a write share the next one.
 */
export function createStateFile(filePath: string): StateFile {
  let running: Promise<void> | null = null;
  let next: Promise<void> | null = null;

  async function replace(state: State): Promise<void> {
    const draftPath = `${filePath}.draft`;
    await mkdir(path.dirname(filePath), { recursive: true });
    const draft = await open(draftPath, 'w', 0o600);
    try {
      await draft.writeFile(JSON.stringify(state));
      await draft.sync();
    } finally {
      await draft.close();
    }
    await rename(draftPath, filePath);
  }

  function start(state: State): Promise<void> {
    running = replace(state).finally(() => {
      running = null;
    });
    return running;
  }

  return {
    read: () => readState(filePath),
    write(state) {
      if (running === null) return start(state);
      next ??= running
        .catch(() => undefined) // reported to whoever asked for that write
        .then(() => {
          next = null;
          return start(state);
        });
      return next;
    },
  };
}

function readState(filePath: string): State {
  if (!existsSync(filePath)) return emptyState();
  const parsed: unknown = JSON.parse(readFileSync(filePath, 'utf8'));
  if (!isState(parsed)) throw new Error(`${filePath} was not written by this payment fake: move it away or reset the demo.`);
  return parsed;
}

/** Our own file: the version tells whether it is ours, the rest is as we wrote it. */
function isState(value: unknown): value is State {
  return typeof value === 'object' && value !== null && 'version' in value && value.version === 1 && 'documents' in value;
}
