import { render, screen, waitFor } from '@testing-library/react';
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

  it('says so when somebody else wrote on it, and loses nothing', async () => {
    show(() => Response.json({}, { status: 412 }));
    await bores(['2.2405']);
    await screen.findByText(/Somebody else wrote on this sheet/, undefined, { timeout: 2000 });
    expect(screen.getByLabelText<HTMLInputElement>('Bearing bores, Rod 1').value).toBe('2.2405');
  });
});
