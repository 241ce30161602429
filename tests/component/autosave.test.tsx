import { render, screen, waitFor } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { afterEach, describe, expect, it, vi } from 'vitest';
import { Autosave } from '@/components/forms/autosave';
import { TextField } from '@/components/forms/fields';
import { Form, Submit } from '@/components/forms/form';
import type { FormState } from '@/lib/forms/form-state';

interface Sent {
  readonly version: string | undefined;
  readonly body: unknown;
}

/** A form with a server behind it that counts versions on, slowly where asked. */
function show({ slow = 0, status = 200 } = {}) {
  const kept: Sent[] = [];
  const pressed: Record<string, string>[] = [];
  let version = 0;
  vi.stubGlobal('fetch', async (_url: string, init: { headers: Record<string, string>; body: string }) => {
    kept.push({ version: init.headers['if-match'], body: JSON.parse(init.body) });
    if (slow > 0) await new Promise((resolve) => setTimeout(resolve, slow));
    version += 1;
    return Response.json({ version }, { status });
  });
  const action = (_state: FormState, form: FormData): Promise<FormState> => {
    const values = Object.fromEntries(
      [...form].map(([name, value]) => [name, typeof value === 'string' ? value : value.name]),
    );
    pressed.push(values);
    return Promise.resolve({ message: 'Choose at least one part.', values });
  };
  render(
    <Form action={action} hidden={{ orderId: 'o' }}>
      <TextField name="notes" label="Notes" />
      <Submit>Go on</Submit>
      <Autosave url="/kept" version={0} lists={['partIds']} />
    </Form>,
  );
  return { kept, pressed };
}

afterEach(() => vi.unstubAllGlobals());
const soon = { timeout: 3000 };

describe('a form that is kept while one types', () => {
  it('sends what is typed under the version that the save before it made', async () => {
    const { kept } = show();
    await userEvent.type(screen.getByLabelText('Notes'), 'one');
    await waitFor(
      () => expect(kept).toEqual([{ version: '"0"', body: { notes: 'one', partIds: [] } }]),
      soon,
    );
    await screen.findByText('Kept as you type.');
    await userEvent.type(screen.getByLabelText('Notes'), ' two');
    await waitFor(
      () => expect(kept[1]).toEqual({ version: '"1"', body: { notes: 'one two', partIds: [] } }),
      soon,
    );
  });

  it('goes on from there when the press was refused and the fields were made anew', async () => {
    const { kept, pressed } = show();
    await userEvent.type(screen.getByLabelText('Notes'), 'one');
    await screen.findByText('Kept as you type.', undefined, soon);
    await userEvent.click(screen.getByRole('button', { name: 'Go on' }));
    await screen.findByText('Choose at least one part.');
    expect(pressed[0]).toMatchObject({ version: '1', notes: 'one' });
    await userEvent.type(screen.getByLabelText('Notes'), '!');
    await waitFor(
      () => expect(kept[1]).toEqual({ version: '"1"', body: { notes: 'one!', partIds: [] } }),
      soon,
    );
  });

  it('lets a press wait for the save that is on its way, and carries its version', async () => {
    const { kept, pressed } = show({ slow: 400 });
    await userEvent.type(screen.getByLabelText('Notes'), 'one');
    await waitFor(() => expect(kept).toHaveLength(1), soon);
    await userEvent.click(screen.getByRole('button', { name: 'Go on' }));
    expect(pressed).toEqual([]);
    await waitFor(() => expect(pressed).toHaveLength(1), soon);
    expect(pressed[0]).toMatchObject({ version: '1', notes: 'one' });
  });

  it('keeps nothing twice: what is typed just before a press goes with the press', async () => {
    const { kept, pressed } = show();
    await userEvent.type(screen.getByLabelText('Notes'), 'one');
    await userEvent.click(screen.getByRole('button', { name: 'Go on' }));
    await waitFor(() => expect(pressed).toHaveLength(1), soon);
    await new Promise((resolve) => setTimeout(resolve, 700));
    expect(kept).toEqual([]);
  });

  it.each([
    [412, /changed on another screen/],
    [422, /something here cannot be read/],
    [404, /something here cannot be read/],
    [503, /no connection/],
  ])('says what became of it: %s', async (status, words) => {
    show({ status });
    await userEvent.type(screen.getByLabelText('Notes'), 'one');
    await screen.findByText(words, undefined, soon);
    expect(screen.getByLabelText<HTMLInputElement>('Notes').value).toBe('one');
  });
});
