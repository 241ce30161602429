import { randomUUID } from 'node:crypto';
import { beforeAll, describe, expect, it } from 'vitest';
import { begin } from '@/db/client';
import { loadAlreadyCut } from '@/db/read-models/already-cut';
import { postReadings } from '@/lib/services/readings';
import { keepWorksheet, previewOf, releaseSizes } from '@/lib/services/worksheets';
import type { WorksheetRow } from '@/db/repositories/worksheets';
import { findWorksheets } from '@/db/repositories/worksheets';
import { ownDatabase, readAsSuperuser } from '../support/database';
import { buildDraft, handOver, keyBack, price, type TestOrder } from '../support/orders';
import { inches } from '../support/worksheet';

const database = ownDatabase();
const read = <T>(sql: string, values: readonly unknown[] = []) =>
  readAsSuperuser<T>(database.superuserUrl(), sql, values);

const REV1 = ['1.8870', '1.8869', '1.8871', '1.8869', '1.8868', '1.8870'];

// Job 11 of tests/reference/data/jobs.md: sizes changed while cutting, both branches.
describe('what is already cut', () => {
  let order: TestOrder;
  let rods: string;
  const sheet = async (): Promise<WorksheetRow> => {
    const [row] = await begin(order.sender.owner, (tx) => findWorksheets(tx, order.id));
    if (!row) throw new Error('No sheet');
    return row;
  };
  const type = async (bores: readonly string[]) => {
    const { id, version, raw } = await sheet();
    const columns = Object.fromEntries(bores.map((bore, index) => [`bores.${index + 1}`, bore]));
    const base = {
      standardLow: '1.8990',
      standardHigh: '1.9000',
      undersize: '.015',
      least: '.0018',
      most: '.0030',
    };
    await keepWorksheet(order.sender.owner, id, version, { ...base, ...raw, ...columns });
  };
  const release = async (reason: string, past?: 'as_is') => {
    const [row] = await read<{ version: number }>('select version from orders where id = $1', [order.id]);
    const press = { orderId: order.id, expectedVersion: row?.version ?? 0, requestKey: randomUUID() };
    return releaseSizes(order.sender.owner, { ...press, reason, past });
  };
  const preview = async () => {
    const { cut } = await begin(order.sender.owner, (tx) => loadAlreadyCut(tx, order.id));
    return previewOf(cut, await sheet(), { unit: 'in', house: { unit: 'in', typed: {} } });
  };

  beforeAll(async () => {
    order = await buildDraft(['grind_rods']);
    rods = order.lineIds[0] ?? '';
    await order.act('sender', { do: 'send' });
    await order.act('partner', price(order.lineIds));
    await order.act('sender', { do: 'agree', revision: 1 });
    await order.act('sender', handOver('sent', order.partId));
    await order.act('partner', handOver('checked_in', order.partId));
    await type(REV1);
    await release('');
    await order.act('partner', keyBack(rods, 1, '1.8850', '1.8845'));
    await order.act('partner', { do: 'start', lineId: rods });
    const reading = (feature: string, text: string) => ({
      ...{
        id: randomUUID(),
        lineId: rods,
        feature,
        position: 'front, in line',
        stage: 'cut' as const,
        unit: 'in' as const,
      },
      ...{
        typedText: text,
        comparator: null,
        size: inches(text),
        instrument: '',
        partMc: null,
        temperatureText: '',
      },
      ...{ takenAt: new Date().toISOString(), replacesId: null },
    });
    await postReadings(order.partner.owner, order.id, [reading('1', '1.8848'), reading('2', '1.8849')]);
  });

  it('is shown before the release, held against the sheet as it stands: rod 4 at 1.8865', async () => {
    await type(['', '', '', '1.8865', '', ''].map((bore, index) => bore || (REV1[index] ?? '')));
    expect(await preview()).toMatchObject([
      { feature: '1', is: { state: 'to_cut', by: inches('.0001') }, runs: { clearance: inches('.0022') } },
      { feature: '2', is: { state: 'to_cut', by: inches('.0002') }, runs: { clearance: inches('.0020') } },
    ]);
  });

  it('says in the larger branch what is past it, and what would run over the most that is wanted', async () => {
    await type(['1.8879', '1.8877', '1.8878', '1.8877', '1.8876', '1.8877']);
    expect(await preview()).toMatchObject([
      {
        feature: '1',
        is: { state: 'past', by: inches('.0005') },
        runs: { clearance: inches('.0031'), isOver: true },
      },
      {
        feature: '2',
        is: { state: 'past', by: inches('.0004') },
        runs: { clearance: inches('.0028'), isOver: false },
      },
    ]);
    await expect(release('all bores measured again')).rejects.toMatchObject({
      code: 'invalid',
      fields: { past: ['Decide what becomes of what is past size.'] },
    });
    expect(await read('select number from revs where order_id = $1', [order.id])).toHaveLength(1);
    await release('all bores measured again', 'as_is');
    expect(await read('select reason from revs where order_id = $1 and number = 2', [order.id])).toEqual([
      {
        reason: 'all bores measured again. Past size at these limits: rods 1, rods 2; accepted as they are.',
      },
    ]);
  });

  it('stands beside the new limits once it is said at the STOP, also what was on the machine', async () => {
    const cut = ['1', '2', '3', '4', '5', '6'].map((feature) => {
      const text = { 1: '1.8848', 2: '1.8849', 3: '1.8856' }[feature] ?? '';
      return { lineId: rods, feature, text, size: text === '' ? null : inches(text) };
    });
    await order.act('partner', { do: 'answer_stop', cut });
    const known = await begin(order.partner.owner, (tx) => loadAlreadyCut(tx, order.id));
    expect(known.said).toMatchObject({
      rev: 2,
      cut: [{ feature: '1' }, { feature: '2' }, { feature: '3', text: '1.8856' }],
    });
    // Journals 1 and 2 by their readings, 3 by what was said.
    expect(known.cut.map(({ feature, sizes }) => [feature, ...sizes])).toEqual([
      ['1', inches('1.8848')],
      ['2', inches('1.8849')],
      ['3', inches('1.8856')],
    ]);
    // The new number is 1.8858 (+.0000 -.0005): journal 3 is in size.
    expect((await preview()).map(({ feature, is }) => [feature, is.state])).toEqual([
      ['1', 'past'],
      ['2', 'past'],
      ['3', 'in_size'],
    ]);
  });

  it('of an earlier round is not taken for this one, once the work was sent back', async () => {
    await order.act('partner', keyBack(rods, 2, '1.8858', '1.8853'));
    await order.act('partner', { do: 'report', unread: [{ lineId: rods, reason: 'on paper' }] });
    await order.act('partner', handOver('sent_back', order.partId));
    await order.act('sender', handOver('received', order.partId));
    const decision = { lineId: rods, decision: 'send_back' as const, reason: 'journal 4', features: ['4'] };
    await order.act('sender', { do: 'decide', decisions: [decision] });
    const known = await begin(order.sender.owner, (tx) => loadAlreadyCut(tx, order.id));
    expect(known).toEqual({ cut: [], said: null });
  });
});
