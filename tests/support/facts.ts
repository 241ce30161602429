import type { Facts, LineFact, PartFact, SizeFact, Status } from '@/lib/domain/orders/facts';
import { inches } from './worksheet';

/** A crank test line and a grinding line, as facts. */
export const WASH: LineFact = {
  ...{
    id: 'wash',
    operation: 'hot_wash',
    title: 'Hot wash',
    needsSizes: false,
    started: false,
    stopDue: false,
  },
  ...{ partIds: ['crank'], kit: [], required: [] },
};
export const RODS: LineFact = {
  ...{
    id: 'rods',
    operation: 'grind_rods',
    title: 'Grind rod journals',
    needsSizes: true,
    started: false,
    stopDue: false,
  },
  ...{ partIds: ['crank'], kit: [], required: ['1|front, in line'] },
};
export const CRANK: PartFact = { id: 'crank', kind: 'crankshaft', pieces: 1, stamps: ['F318'] };

/** The one size of the grinding line. */
export const SIZE: SizeFact = {
  ...{ lineId: 'rods', since: 1, feature: '1', what: 'Rods', cutting: 'smaller', partner: null },
  ...{ target: inches('1.8850'), lower: inches('1.8845'), upper: inches('1.8850') },
};

const SHOP = { shopId: 's', name: 'Sender', unit: 'in', timeZone: 'UTC' } as const;

/** Facts of an order in a status, with whatever matters to the test laid over. */
export function factsOf(status: Status, over: Partial<Facts> = {}): Facts {
  return {
    ...{
      id: 'order',
      number: 1,
      version: 1,
      logSeq: 0,
      status,
      round: 1,
      acceptRule: 'own_check',
      currency: 'USD',
    },
    ...{ sender: SHOP, partner: { ...SHOP, shopId: 'p', name: 'Partner' }, partnership: 'active' },
    ...{ neededBackOn: null, promisedOn: null, firstPromisedOn: null, promiseDays: null },
    ...{
      lines: [WASH, RODS],
      parts: [CRANK],
      moves: [],
      restamps: [],
      quotes: [],
      latestRev: null,
      sizes: [],
      repeated: [],
    },
    ...{ holds: [], snags: [], read: [], decisions: [], clock: 'none' },
    punches: { price: 'unmet', parts: 'unmet', sizes: 'unmet' },
    ...over,
  };
}

const move = (id: string, kind: Facts['moves'][number]['kind']) => ({
  id,
  partId: 'crank',
  kind,
  pieces: 1,
  stamps: ['F318'],
  kit: [],
  replacesId: null,
});

/** Pieces that have travelled so far. */
export const MOVES = {
  sent: [move('1', 'sent')],
  there: [move('1', 'sent'), move('2', 'checked_in')],
  back: [move('1', 'sent'), move('2', 'checked_in'), move('3', 'sent_back')],
  home: [move('1', 'sent'), move('2', 'checked_in'), move('3', 'sent_back'), move('4', 'received')],
} as const;

/** A price of the work in a state. */
export function quote(
  state: Facts['quotes'][number]['state'],
  kind: Facts['quotes'][number]['kind'] = 'work',
): Facts['quotes'][number] {
  return { revision: 1, kind, totalMinor: 100, promisedOn: null, promiseDays: null, validUntil: null, state };
}

/** The rods' size as repeated back. */
export const REPEATED = { lineId: 'rods', since: 1, what: 'Rods', lower: SIZE.lower, upper: SIZE.upper };
