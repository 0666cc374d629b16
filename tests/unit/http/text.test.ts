import { unstorableValues } from '@/server/http/text';

const fields = (value: unknown): string[] => unstorableValues(value).map((error) => error.field);

describe('values that no field may hold', () => {
  it.each([
    ['a NUL character', { items: [{ note: 'a\0b' }] }, 'items[0].note'],
    ['half a surrogate pair', { note: 'a\ud800' }, 'note'],
    ['a number without end', JSON.parse('{"amountMinor":1e999}'), 'amountMinor'],
    ['a key that would reach the prototype', JSON.parse('{"a":{"__proto__":{"admin":true}}}'), 'a.__proto__'],
    ['text of more than 20,000 characters', { note: 'x'.repeat(20_001) }, 'note'],
  ])('are found: %s', (_name, value, field) => {
    expect(fields(value)).toEqual([field]);
  });

  it('leave ordinary text of every script alone', () => {
    expect(fields({ a: 'Ærø – 8×6 💎 ﷽', b: [1, -2.5, null, true], c: {} })).toEqual([]);
  });

  it('stop nesting that would exhaust the stack, without exhausting it', () => {
    const deep: unknown = JSON.parse(`${'['.repeat(50_000)}1${']'.repeat(50_000)}`);
    expect(unstorableValues(deep)).toHaveLength(1);
  });

  it('stop more values than any screen sends', () => {
    expect(unstorableValues(Array.from({ length: 30_000 }, () => 1))).toHaveLength(1);
  });
});
