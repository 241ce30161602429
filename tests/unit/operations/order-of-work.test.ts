import { describe, expect, it } from 'vitest';
import { OPERATIONS } from '@/lib/domain/operations/catalogue';
import { inOrderOfWork, missingBefore } from '@/lib/domain/operations/order-of-work';

describe('the order of work', () => {
  it('puts each operation after those that the catalogue names before it, and loses none', () => {
    const keys = OPERATIONS.map(({ key }) => key);
    const ordered = inOrderOfWork(keys.toReversed());
    expect(ordered.toSorted()).toEqual(keys.toSorted());
    for (const { key, after } of OPERATIONS)
      for (const earlier of after) expect(ordered.indexOf(earlier)).toBeLessThan(ordered.indexOf(key));
  });

  it('is the same whatever order the boxes were ticked in', () => {
    expect(inOrderOfWork(['polish', 'crack_test', 'grind_rods'])).toEqual([
      'crack_test',
      'grind_rods',
      'polish',
    ]);
    expect(inOrderOfWork(['grind_rods', 'polish', 'crack_test'])).toEqual([
      'crack_test',
      'grind_rods',
      'polish',
    ]);
  });

  it('asks only where nothing of what usually comes before is on the order', () => {
    expect(missingBefore(['grind_rods'])).toEqual([
      { key: 'grind_rods', earlier: ['hot_wash', 'crack_test'] },
    ]);
    expect(missingBefore(['crack_test', 'grind_rods', 'polish'])).toEqual([
      { key: 'crack_test', earlier: ['hot_wash'] },
    ]);
    expect(missingBefore(['hot_wash', 'crack_test', 'grind_rods', 'polish'])).toEqual([]);
    expect(missingBefore([])).toEqual([]);
  });
});
