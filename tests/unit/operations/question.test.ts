import { describe, expect, it } from 'vitest';
import { column, made, workOut } from '../../support/worksheet';

const REST = { standardLow: '2.1240', standardHigh: '2.1250', undersize: '.010', least: '.0020' };
const BORES = '2.1172 2.1171 2.1173 2.1172 2.1170 2.1172';
const six = { made: made('inline6') };

function ask(rod: number, typed: string, more = {}) {
  return workOut(
    'grind_rods',
    { ...REST, ...column('bores', '', BORES), [`bores.${rod}`]: typed, ...more },
    six,
  ).filled.questions;
}

describe('slips are questioned where they are typed', () => {
  it.each([
    ['a point moved right', '21.172', '2.1172'],
    ['a point moved left', '.21172', '2.1172'],
    ['two figures swapped', '2.1712', '2.1172'],
    ['a 7 for a 1', '2.1772', '2.1172'],
    ['an inch for a tenth', '3.1172', '2.1172'],
  ])('%s: %s was probably %s', (_slip, typed, meant) => {
    expect(ask(4, typed).some((question) => question.path === 'bores.4' && question.meant === meant)).toBe(
      true,
    );
  });

  it('lets a value stand that somebody says was measured so', () => {
    expect(ask(4, '2.1272', { 'keep:bores.4': '2.1272' })).toEqual([]);
    expect(ask(4, '2.1273', { 'keep:bores.4': '2.1272' })).toHaveLength(1);
  });

  it('says nothing of six sound bores', () => {
    expect(ask(4, '2.1174')).toEqual([]);
  });
});
