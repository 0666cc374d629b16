import type { InstrumentView } from '@shared/api/instruments';
import type { KitView, ReadingEntry, StoneView } from '@shared/api/kits';
import { as, type TestApp, type TestPerson } from './testApp';

/** Makes kits, stones and readings as a member of staff does: over the routes. */
export function catalogueOf(test: TestApp, staff: TestPerson) {
  const call = as(test, staff);

  async function instruments(): Promise<Record<'balance' | 'caliper' | 'refractometer' | 'polariscope', string>> {
    const made = async (body: object): Promise<string> => ((await call.post('/instruments', body).expect(201)).body as InstrumentView).id;
    return {
      balance: await made({ kind: 'balance', name: 'Balance', resolution: 0.01, standardUncertainty: 0.006 }),
      caliper: await made({ kind: 'caliper', name: 'Calipers', resolution: 0.01, standardUncertainty: 0.014 }),
      refractometer: await made({ kind: 'refractometer', name: 'Refractometer', standardUncertainty: 0.0015, spotUncertainty: 0.006, liquidLimitRi: 1.81 }),
      polariscope: await made({ kind: 'polariscope', name: 'Polariscope' }),
    };
  }

  async function kit(number: string, body: object = {}): Promise<KitView> {
    return (await call.post('/kits', { number, title: `True title ${number}`, neutralTitle: `Practice set ${number}`, ...body }).expect(201)).body as KitView;
  }

  async function stone(kitId: string, slot: string, body: object = {}): Promise<StoneView> {
    const request = { slot, species: 'topaz', colour: 'blue', shape: 'oval', neutralDescription: 'pale blue oval, 8×6', replacementValueMinor: 7000, ...body };
    return (await call.post(`/kits/${kitId}/stones`, request).expect(201)).body as StoneView;
  }

  async function readings(stoneId: string, entries: ReadingEntry[]): Promise<StoneView> {
    return (await call.post(`/stones/${stoneId}/readings`, { readings: entries }).expect(201)).body as StoneView;
  }

  return { call, instruments, kit, stone, readings };
}

export type Catalogue = ReturnType<typeof catalogueOf>;

/** Enough readings for a topaz of 8×6 mm to be lent. */
export function completeTopaz(of: Awaited<ReturnType<Catalogue['instruments']>>): ReadingEntry[] {
  return [
    { attribute: 'weight_ct', value: 1.57, instrumentId: of.balance },
    { attribute: 'length_mm', value: 8.02, instrumentId: of.caliper },
    { attribute: 'width_mm', value: 6.01, instrumentId: of.caliper },
    { attribute: 'height_mm', value: 3.52, instrumentId: of.caliper },
    { attribute: 'polariscope', category: 'DR', instrumentId: of.polariscope },
    { attribute: 'ri_spot', value: 1.62, instrumentId: of.refractometer },
  ];
}
