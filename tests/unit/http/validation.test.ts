import 'reflect-metadata';
import { Type } from 'class-transformer';
import { ArrayMaxSize, IsArray, IsInt, IsOptional, Max, Min, ValidateNested } from 'class-validator';
import { IfSent, Words } from '@/server/http/decorators';
import { Invalid } from '@/server/http/problem';
import { validated } from '@/server/http/validation';

class ItemBody {
  @IsInt() @Min(1) @Max(100)
  amountMinor!: number;
}
class KeepBody {
  @IsArray() @ArrayMaxSize(3) @ValidateNested({ each: true }) @Type(() => ItemBody)
  items!: ItemBody[];

  @IfSent() @Words(3, 10)
  reason?: string;

  @IsOptional() @Type(() => Number) @IsInt()
  limit?: number;
}

async function refusedFields(body: unknown): Promise<string[]> {
  const error: unknown = await validated(KeepBody, body).catch((thrown: unknown) => thrown);
  return error instanceof Invalid ? error.errors.map(({ field }) => field) : [];
}

describe('validating a body', () => {
  it('makes the DTO and trims words', async () => {
    const body = await validated(KeepBody, { items: [{ amountMinor: 5 }], reason: '  chipped ' });
    expect(body).toBeInstanceOf(KeepBody);
    expect(body.items[0]).toBeInstanceOf(ItemBody);
    expect(body.reason).toBe('chipped');
  });

  it.each([
    [{ items: [{ amountMinor: 0 }] }, ['items[0].amountMinor']],
    [{ items: [{ amountMinor: 1 }, { amountMinor: '2' }] }, ['items[1].amountMinor']],
    [{ items: [{ amountMinor: 1, colour: 'red' }] }, ['items[0].colour']],
    [{ items: 'none' }, ['items']],
    [{ items: [], extra: 1 }, ['extra']],
    [{ items: [], reason: null }, ['reason']],
    [{ items: [], reason: 'x' }, ['reason']],
    [{}, ['items']],
    [null, ['']],
    [[], ['']],
    ['text', ['']],
  ])('names the wrong fields of %j', async (body, fields) => {
    expect(await refusedFields(body)).toEqual(fields);
  });

  it('does not turn text into numbers unless the DTO asks for it', async () => {
    await expect(validated(KeepBody, { items: [], limit: '7' })).resolves.toMatchObject({ limit: 7 });
    expect(await refusedFields({ items: [], limit: 'seven' })).toEqual(['limit']);
  });
});
