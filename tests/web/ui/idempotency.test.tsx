import { act, screen, waitFor } from '@testing-library/react';
import { ApiProblem, NoAnswer, useIdempotentMutation } from '@/components/api';
import { claimKey, settleKey } from '@/components/api/idempotency';
import * as Ui from '@/components/ui';
import { show } from './harness';

jest.mock('expo-router', () => jest.requireActual<typeof import('./expoRouter')>('./expoRouter'));

/** All that storage holds. */
function stored(): [string, string | null][] {
  return Object.keys(localStorage).map((key) => [key, localStorage.getItem(key)]);
}

let made = 0;
beforeEach(() => {
  localStorage.clear();
  made = 0;
  Object.defineProperty(globalThis, 'crypto', { configurable: true, value: { randomUUID: () => `key-${++made}` } });
});

describe('the key of a write', () => {
  it('is stored before it is used and the same for the same intent', () => {
    const key = claimKey('loans/start', { code: 'K7', borrowerId: 'b' });
    expect(stored().join()).toContain(key);
    expect(claimKey('loans/start', { borrowerId: 'b', code: 'K7' })).toBe(key);
  });

  it('is another one for other content and for another operation', () => {
    const key = claimKey('loans/start', { code: 'K7' });
    expect(claimKey('loans/return', { code: 'K7' })).not.toBe(key);
    expect(claimKey('loans/start', { code: 'K8' })).not.toBe(key);
  });

  it('does not store what was sent', () => {
    claimKey('loans/objection', { text: 'It was chipped before' });
    expect(JSON.stringify(stored())).not.toContain('chipped');
  });

  it('outlives a lost answer and a broken server, and ends with a final answer', () => {
    const key = claimKey('a', 1);
    settleKey('a', new NoAnswer(null));
    settleKey('a', new ApiProblem(503));
    expect(claimKey('a', 1)).toBe(key);
    settleKey('a', new ApiProblem(409));
    expect(claimKey('a', 1)).not.toBe(key);
  });

  it('tells two photos apart', () => {
    const first = new File(['a'], 'a.jpg', { lastModified: 1 });
    const key = claimKey('photo', { file: first });
    expect(claimKey('photo', { file: first })).toBe(key);
    expect(claimKey('photo', { file: new File(['ab'], 'a.jpg', { lastModified: 2 }) })).not.toBe(key);
  });
});

describe('useIdempotentMutation', () => {
  it('repeats a lost answer with the same key and takes a new one for the next intent', async () => {
    const keys: string[] = [];
    const send = jest.fn(async (_: { code: string }, { idempotencyKey }: { idempotencyKey: string }) => {
      keys.push(idempotencyKey);
      if (keys.length === 1) throw new NoAnswer(null);
      return 'out';
    });
    function Start() {
      const start = useIdempotentMutation({ operation: 'loans/start', send, retryDelay: 1 });
      return <Ui.Button label={start.data ?? 'Take out'} onPress={() => start.mutate({ code: 'K7' })} />;
    }
    show(<Start />);
    act(() => screen.getByRole('button').click());
    await waitFor(() => expect(screen.getByRole('button', { name: 'out' })).toBeInTheDocument());
    expect(keys).toEqual(['key-1', 'key-1']);
    act(() => screen.getByRole('button').click());
    await waitFor(() => expect(keys).toEqual(['key-1', 'key-1', 'key-2']));
  });
});
