import { describe, expect, it } from 'vitest';
import { stand, whyNotClear } from '@/lib/domain/orders/stand';
import { factsOf, MOVES, quote, REPEATED, RODS, SIZE, WASH } from '../../support/facts';

const AGREED = { quotes: [quote('agree')] };
const SIZED = { sizes: [SIZE], latestRev: 1 };
const hold = { id: 'h', lineId: null, reason: 'parts' as const, words: 'x', placedBy: 'partner' as const };
const snag = { id: 'g', lineId: null, sizesDue: false, priceMinor: 0, days: 0 };

describe('whose move it is: the ordered table', () => {
  it.each([
    ['draft', factsOf('draft'), 'none', 'Finish and send', null],
    [
      'snag raised',
      factsOf('cutting', { snags: [{ ...snag, state: 'raised' }] }),
      'snag',
      'Decide about the snag',
      null,
    ],
    [
      'snag asked back',
      factsOf('cutting', { snags: [{ ...snag, state: 'asked' }] }),
      'snag',
      null,
      'Answer about the snag',
    ],
    [
      'snag approved, sizes due',
      factsOf('cutting', { snags: [{ ...snag, state: 'approved', sizesDue: true }] }),
      'snag',
      'Give the new sizes',
      null,
    ],
    [
      'hold for the sender',
      factsOf('sent', { holds: [{ ...hold, waitsFor: 'sender' }] }),
      'sender',
      'Clear the hold',
      null,
    ],
    [
      'hold for the partner',
      factsOf('sent', { holds: [{ ...hold, waitsFor: 'partner' }] }),
      'partner',
      null,
      'Clear the hold',
    ],
    ['sent', factsOf('sent'), 'partner', null, 'Name a price'],
    ['quoted, valid', factsOf('quoted', { quotes: [quote('open')] }), 'sender', 'Answer the price', null],
    [
      'quoted, asked',
      factsOf('quoted', { quotes: [quote('ask')] }),
      'partner',
      null,
      'Answer about the price',
    ],
    ['quoted, expired', factsOf('quoted', { quotes: [quote('expired')] }), 'partner', null, 'Quote again'],
    ['pieces not handed over', factsOf('agreed', AGREED), 'sender', 'Send the parts', null],
    [
      'a line without sizes, pieces there',
      factsOf('agreed', { ...AGREED, moves: MOVES.there }),
      'sender',
      'Work out the sizes',
      null,
    ],
    [
      'no sizes and pieces on the road: both have a step',
      factsOf('agreed', { ...AGREED, moves: MOVES.sent }),
      'sender',
      'Work out the sizes',
      'Check in the parts',
    ],
    [
      'pieces on the road',
      factsOf('agreed', { ...AGREED, ...SIZED, repeated: [REPEATED], moves: MOVES.sent }),
      'road',
      null,
      'Check in the parts',
    ],
    [
      'a size not repeated back',
      factsOf('agreed', { ...AGREED, ...SIZED, moves: MOVES.there }),
      'partner',
      null,
      'Repeat the sizes back',
    ],
    [
      'agreed, clear',
      factsOf('agreed', { ...AGREED, ...SIZED, repeated: [REPEATED], moves: MOVES.there }),
      'partner',
      null,
      'Put it on the machine',
    ],
    [
      'cutting, clear',
      factsOf('cutting', { ...AGREED, ...SIZED, repeated: [REPEATED], moves: MOVES.there }),
      'partner',
      null,
      'Cut, post readings, report',
    ],
    [
      'inspection agreed, work not priced',
      factsOf('agreed', {
        quotes: [quote('agree', 'inspection')],
        ...SIZED,
        repeated: [REPEATED],
        moves: MOVES.there,
      }),
      'partner',
      null,
      'Name a price for the work',
    ],
    [
      'STOP not answered',
      factsOf('cutting', {
        ...AGREED,
        ...SIZED,
        repeated: [REPEATED],
        moves: MOVES.there,
        lines: [WASH, { ...RODS, started: true, stopDue: true }],
      }),
      'partner',
      null,
      'Say what is already cut',
    ],
    [
      'reported, decided on readings',
      factsOf('reported', { acceptRule: 'readings', moves: MOVES.there }),
      'sender',
      'Check and decide',
      null,
    ],
    [
      'reported, own check, parts at the partner',
      factsOf('reported', { moves: MOVES.there }),
      'partner',
      null,
      'Send the parts back',
    ],
    [
      'reported, own check, on the road',
      factsOf('reported', { moves: MOVES.back }),
      'road',
      'Receive the parts',
      null,
    ],
    [
      'reported, own check, parts home',
      factsOf('reported', { moves: MOVES.home }),
      'sender',
      'Check and decide',
      null,
    ],
    [
      'cancelled, settlement not named',
      factsOf('cancelled', { moves: MOVES.there }),
      'partner',
      null,
      'Say what is owed',
    ],
    [
      'cancelled, settlement named',
      factsOf('cancelled', { moves: MOVES.there, quotes: [quote('open', 'settlement')] }),
      'sender',
      'Answer what is owed',
      null,
    ],
    [
      'cancelled and settled, pieces at the partner',
      factsOf('cancelled', { moves: MOVES.there, quotes: [quote('agree', 'settlement')] }),
      'partner',
      null,
      'Send the parts back',
    ],
    [
      'accepted, pieces on the road',
      factsOf('accepted', { moves: MOVES.back }),
      'road',
      'Receive the parts',
      null,
    ],
    [
      'declined, pieces at the partner',
      factsOf('declined', { moves: MOVES.there }),
      'partner',
      null,
      'Send the parts back',
    ],
    ['closed', factsOf('closed', { moves: MOVES.home }), 'none', null, null],
  ] as const)('%s', (_row, facts, clock, senderStep, partnerStep) => {
    expect(stand(facts)).toMatchObject({ clock, senderStep, partnerStep });
  });
});

describe('clear to cut, line by line', () => {
  const ready = factsOf('agreed', { ...AGREED, moves: MOVES.there });

  it('needs no sizes where no sized metal comes off', () => {
    expect(stand(ready)).toMatchObject({ clear: false, clearLines: ['wash'] });
    expect(whyNotClear(ready, RODS)).toBe('There are no sizes yet.');
  });

  it('is covered by a hold, by a snag, by a missing price or part', () => {
    const blocked = [
      { holds: [{ ...hold, waitsFor: 'sender' as const }] },
      { snags: [{ ...snag, state: 'raised' as const }] },
      { quotes: [quote('open')] },
      { moves: MOVES.sent },
    ];
    expect(blocked.map((over) => stand({ ...ready, ...over }).clearLines)).toEqual([[], [], [], []]);
    expect(blocked.map((over) => whyNotClear({ ...ready, ...over }, WASH))).toEqual([
      'A hold stands.',
      'A snag waits for its answer.',
      'The price is not agreed.',
      'The parts are not all here: 0 of 1 crankshaft.',
    ]);
  });

  it('lets an agreed inspection fee do for a line without sizes, and only for that', () => {
    const inspected = { ...ready, ...SIZED, repeated: [REPEATED], quotes: [quote('agree', 'inspection')] };
    expect(stand(inspected).clearLines).toEqual(['wash']);
  });

  it('waits for the kit that an operation names', () => {
    const withKit = { ...ready, lines: [{ ...WASH, kit: ['pistons'] }] };
    expect(whyNotClear(withKit, { ...WASH, kit: ['pistons'] })).toBe(
      'The parts are not all here: without pistons.',
    );
  });

  it('keeps the punches as they were from reported on', () => {
    const punches = { price: 'met', parts: 'met', sizes: 'met' } as const;
    expect(stand(factsOf('reported', { punches, moves: MOVES.home })).punches).toEqual(punches);
  });
});

describe('pieces by stamp', () => {
  const rods = { id: 'r', kind: 'rods', pieces: 8, stamps: ['1', '2', '3', '4', '5', '6', '7', '8'] };
  const order = (stamps: readonly string[]) =>
    factsOf('agreed', {
      ...AGREED,
      parts: [rods],
      lines: [{ ...WASH, partIds: ['r'] }],
      moves: [
        { id: '1', partId: 'r', kind: 'sent', pieces: 8, stamps: rods.stamps, kit: [], replacesId: null },
        {
          id: '2',
          partId: 'r',
          kind: 'checked_in',
          pieces: stamps.length,
          stamps,
          kit: [],
          replacesId: null,
        },
      ],
    });

  // Job 8 of tests/reference/data/jobs.md.
  it('names the one that is missing, refuses the right count of the wrong pieces, and is punched by the right stamps', () => {
    const [seven, doubled, right] = [
      order(['1', '2', '3', '4', '5', '7', '8']),
      order(['1', '2', '3', '4', '5', '7', '8', '5']),
      order(['1', '2', '3', '4', '5', '7', '8', '6']),
    ];
    expect(whyNotClear(seven, seven.lines[0] ?? WASH)).toBe(
      'The parts are not all here: 7 of 8 rods, 6 missing.',
    );
    expect(whyNotClear(doubled, doubled.lines[0] ?? WASH)).toBe(
      'The parts are not all here: rods: two are stamped 5, none is 6.',
    );
    expect(stand(doubled).punches.parts).toBe('unmet');
    expect(stand(right).punches.parts).toBe('met');
  });
});
