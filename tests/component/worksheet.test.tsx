import { render, screen, waitFor, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { afterEach, describe, expect, it, vi } from 'vitest';
import { Worksheet } from '@/components/worksheet/worksheet';
import { findPreset } from '@/lib/domain/builds/presets';

const made = findPreset('inline4');
const RAW = { standardLow: '2.2400', standardHigh: '2.2410', least: '.0020', undersize: '.000' };

function show(answer: () => Response) {
  const sent: { headers: Record<string, string>; raw: Record<string, string> }[] = [];
  vi.stubGlobal('fetch', (_url: string, init: { headers: Record<string, string>; body: string }) => {
    sent.push({ headers: init.headers, raw: (JSON.parse(init.body) as { raw: Record<string, string> }).raw });
    return Promise.resolve(answer());
  });
  if (!made) throw new Error('No inline four');
  render(<Worksheet id="w" version={3} operation="grind_rods" made={made} unit="in" raw={RAW} />);
  return sent;
}

afterEach(() => vi.unstubAllGlobals());

const kept = () => Response.json({ version: 4 });

async function bores(values: readonly string[]) {
  for (const [index, value] of values.entries()) {
    await userEvent.type(screen.getByLabelText(`Bearing bores, Rod ${index + 1}`), value);
  }
}

describe('a worksheet', () => {
  // Common practice, no source: bearing bore 2.2405, at least .0020: journal 2.2385; typed as 2.2380 it leaves .0025.
  it('works itself out while one types, and says what a size typed by hand would leave', async () => {
    show(kept);
    await bores(['2.2405', '2.2405', '2.2406', '2.2405']);
    expect(screen.getAllByText('2.2385').length).toBeGreaterThan(0);
    await userEvent.type(screen.getByLabelText('Finish to, by hand'), '2.2380');
    screen.getByText(/Typed by hand: 2.2380. Worked out: 2.2385. It leaves .0025 at the smallest bore./);
    screen.getByText(/Say why the size is typed by hand/);
  });

  it('questions a value beside its box and counts it as missing until it is answered', async () => {
    show(kept);
    await bores(['2.2405', '2.2405', '2.2406', '2.4205']);
    screen.getByText(/2.4205 is .1800 more than its neighbours/);
    screen.getByText('Something is questioned; answer it first.');
    await userEvent.click(screen.getByRole('button', { name: 'It is 2.2405' }));
    expect(screen.getByLabelText<HTMLInputElement>('Bearing bores, Rod 4').value).toBe('2.2405');
    expect(screen.getAllByText('2.2385').length).toBeGreaterThan(0);
  });

  it('says what is wrong with a text that is no size', async () => {
    show(kept);
    await bores(['2.24O5']);
    screen.getByText(/There is a letter among the figures/);
  });

  it('keeps what was typed, with the version it was made from', async () => {
    const sent = show(kept);
    await bores(['2.2405']);
    await waitFor(
      () =>
        expect(sent.at(-1)).toMatchObject({ headers: { 'if-match': '"3"' }, raw: { 'bores.1': '2.2405' } }),
      { timeout: 2000 },
    );
    await screen.findByText('Kept as you type');
  });

  it('shows both values when somebody else wrote on it, loses nothing, and keeps the one that is chosen', async () => {
    const theirs = { version: 7, raw: { ...RAW, 'bores.1': '2.2407', least: '.0025' } };
    const answers = [Response.json({ current: theirs }, { status: 412 }), Response.json({ version: 8 })];
    const sent = show(() => answers.shift() ?? kept());
    await bores(['2.2405']);
    await screen.findByText(/Somebody else wrote on this sheet/, undefined, { timeout: 2000 });
    const conflict = screen.getByRole('alert', { name: 'Two versions of this sheet' });
    const rows = within(conflict)
      .getAllByRole('row')
      .slice(1)
      .map((row) => [...row.children].map((cell) => cell.textContent));
    expect(rows).toEqual([
      ['Oil clearance, at least', '.0025', '.0020'],
      ['Bearing bores, 1', '2.2407', '2.2405'],
    ]);
    await userEvent.click(screen.getByRole('button', { name: 'Keep mine' }));
    await waitFor(() => expect(sent.at(-1)?.headers).toMatchObject({ 'if-match': '"7"' }), { timeout: 2000 });
    expect(sent.at(-1)?.raw).toMatchObject({ 'bores.1': '2.2405', least: '.0020' });
    await screen.findByText('Kept as you type');
  });

  it('takes the other version with one press', async () => {
    const theirs = { version: 7, raw: { ...RAW, 'bores.1': '2.2407' } };
    show(() => Response.json({ current: theirs }, { status: 412 }));
    await bores(['2.2405']);
    await userEvent.click(await screen.findByRole('button', { name: 'Take theirs' }, { timeout: 2000 }));
    expect(screen.getByLabelText<HTMLInputElement>('Bearing bores, Rod 1').value).toBe('2.2407');
    expect(screen.queryByRole('alert')).toBeNull();
  });

  it('takes the shop’s own default where a box is empty, in the shop’s unit, and says so', async () => {
    if (!made) throw new Error('No inline four');
    const house = {
      unit: 'mm' as const,
      typed: { 'grind_rods.limit': '0.0254', 'grind_rods.undersize': '.010' },
    };
    vi.stubGlobal('fetch', () => Promise.resolve(kept()));
    const props = { id: 'w', version: 1, operation: 'grind_rods', made, unit: 'in' as const, raw: RAW };
    render(<Worksheet {...props} house={house} />);
    await bores(['2.2405', '2.2405', '2.2405', '2.2405']);
    // .0010 below the size instead of .0005; an undersize belongs to the job and is never a default.
    expect(document.body.textContent).toMatch(/2.2385[^0-9]*\+?\.0000[^0-9]*\.0010/);
    expect(screen.getAllByText('your shop’s default')).toHaveLength(1);
  });
});
