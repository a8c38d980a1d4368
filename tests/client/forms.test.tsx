// @vitest-environment jsdom
import { screen, waitFor } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { describe, expect, it, vi } from 'vitest';
import { BenchForm } from '#src/features/benches/bench-form.tsx';
import { CaseForm } from '#src/features/cases/case-form.tsx';
import { SignInForm } from '#src/features/session/sign-in-form.tsx';
import { call } from '#src/lib/call.ts';
import { refuseEveryCall, renderScreen } from '#tests/client/render-screen.tsx';
import { addBench, type Bench } from '#shared/contracts/benches.ts';
import { openCase, type Case } from '#shared/contracts/cases.ts';

const person = { id: '0b6f2a2e-8f0a-4a5e-9a64-0f6f3f1f9c11', name: 'A. Person' };
const bench: Bench = {
  id: '1b6f2a2e-8f0a-4a5e-9a64-0f6f3f1f9c11',
  name: 'Rail',
  note: '',
  geometry: 'sensor',
  wavelength: { value: 632.8e-9, u: 0.1e-9 },
  distance: { value: 0.85, u: 0.0005 },
  pixelPitch: { value: 5.2e-6, u: 0.005e-6 },
  encoding: 'linear',
  bitDepth: 12,
  darkLevel: 64,
  mirrored: false,
  version: 1,
  createdAt: '2026-01-01T00:00:00.000Z',
  createdBy: person,
  can: { edit: true },
};
const stored: Case = {
  id: '2b6f2a2e-8f0a-4a5e-9a64-0f6f3f1f9c11',
  number: 'FW-0001',
  state: 'open',
  stage: 'no-exposure',
  version: 1,
  createdBy: person,
  createdAt: '2026-01-01T00:00:00.000Z',
  updatedAt: '2026-01-01T00:00:00.000Z',
  title: 'Orifice',
  part: 'Plate',
  lot: '',
  specimen: '',
  question: '',
  drawing: {
    aperture: { family: 'slot', values: { length: 200e-6, width: 80e-6 } },
    limits: { width: { lower: 78e-6, upper: 82e-6 } },
  },
  exposures: [],
  matches: [],
  can: { edit: true, upload: true, reopen: false },
};

/** The sentence that is tied to a field. */
function sentenceAt(field: HTMLElement): string | null | undefined {
  const id = field.getAttribute('aria-describedby');
  return id ? document.getElementById(id)?.textContent : null;
}

const post =
  <E extends typeof openCase | typeof addBench>(endpoint: E) =>
  async (body: unknown) => {
    await call(endpoint, { body: body as never });
  };

describe('the form of a case', () => {
  it('shows what the server says about a field at that field, and keeps what was typed', async () => {
    refuseEveryCall('invalid-input', '2 values need a correction.', [
      { pointer: '#/part', detail: 'The part is not known here.' },
      { pointer: '#/drawing/aperture/values/width', detail: 'The width is too large.' },
    ]);
    renderScreen(<CaseForm stored={stored} leaveTo="/" save={post(openCase)} />);
    await userEvent.type(screen.getByLabelText('Lot'), '7');
    await userEvent.click(screen.getByRole('button', { name: 'Save the case' }));
    await waitFor(() =>
      expect(sentenceAt(screen.getByLabelText('Part'))).toBe('The part is not known here.'),
    );
    expect(sentenceAt(screen.getByLabelText(/^Width/))).toBe('The width is too large.');
    expect(document.activeElement).toBe(screen.getByLabelText('Part'));
    expect(screen.getByLabelText<HTMLInputElement>('Lot').value).toBe('7');
  });

  it('asks for what is missing before anything is sent', async () => {
    const sent = refuseEveryCall('internal-fault', 'never');
    renderScreen(<CaseForm stored={null} leaveTo="/" save={post(openCase)} />);
    await userEvent.click(screen.getByRole('button', { name: 'Open the case' }));
    await waitFor(() => expect(sentenceAt(screen.getByLabelText('Title'))).toBe('Enter a title.'));
    expect(sent).not.toHaveBeenCalled();
  });

  it('sends sizes and limits in metres, and leaves out limits that were left empty', async () => {
    const save = vi.fn(async (_draft: unknown) => {});
    renderScreen(<CaseForm stored={{ ...stored, drawing: null }} leaveTo="/" save={save} />);
    await userEvent.selectOptions(screen.getByLabelText('Shape'), 'Slot');
    await userEvent.type(screen.getByLabelText(/^Overall length/), '212');
    await userEvent.type(screen.getByLabelText(/^Width/), '84');
    await userEvent.type(screen.getByLabelText('Lower limit of the width in µm'), '81');
    await userEvent.type(screen.getByLabelText('Upper limit of the width in µm'), '87');
    await userEvent.click(screen.getByRole('button', { name: 'Save the case' }));
    await waitFor(() => expect(save).toHaveBeenCalled());
    expect(save.mock.calls[0][0]).toMatchObject({
      drawing: {
        aperture: { family: 'slot', values: { length: 212e-6, width: 84e-6 } },
        limits: { width: { lower: 81e-6, upper: 87e-6 } },
      },
    });
  });

  it('offers the other version when somebody changed the case meanwhile, and keeps what was typed', async () => {
    refuseEveryCall('stale-edit', 'B. Person saved version 2.');
    const takeTheirs = vi.fn();
    renderScreen(<CaseForm stored={stored} leaveTo="/" save={post(openCase)} onTakeTheirs={takeTheirs} />);
    await userEvent.type(screen.getByLabelText('Lot'), '7');
    await userEvent.click(screen.getByRole('button', { name: 'Save the case' }));
    const alert = await screen.findByRole('alert');
    expect(alert.textContent).toContain('B. Person saved version 2.');
    expect(screen.getByLabelText<HTMLInputElement>('Lot').value).toBe('7');
    await userEvent.click(screen.getByRole('button', { name: 'Drop mine and fetch theirs' }));
    expect(takeTheirs).toHaveBeenCalledOnce();
  });
});

describe('the form of a bench', () => {
  it('shows what the server says about a value at that half of the field', async () => {
    refuseEveryCall('invalid-input', '2 values need a correction.', [
      { pointer: '#/distance/value', detail: 'The distance must lie between 1 mm and 1 000 000 mm.' },
      { pointer: '#/name', detail: 'This name is odd.' },
    ]);
    renderScreen(<BenchForm bench={bench} save={post(addBench)} />);
    await userEvent.click(screen.getByRole('button', { name: 'Save the bench' }));
    const distance = screen.getByRole('textbox', { name: 'Distance in mm' });
    await waitFor(() => expect(sentenceAt(distance)).toContain('between 1 mm'));
    expect(distance).toHaveProperty('ariaInvalid', 'true');
    expect(sentenceAt(screen.getByLabelText('Name'))).toBe('This name is odd.');
  });

  it('calls one metre typed as one millimetre implausible before anything is saved', async () => {
    renderScreen(<BenchForm bench={bench} save={post(addBench)} />);
    const distance = screen.getByRole('textbox', { name: 'Distance in mm' });
    expect(screen.queryByText(/implausible/)).toBeNull();
    await userEvent.clear(distance);
    await userEvent.type(distance, '1');
    expect(screen.getByText(/1\smm is implausible here/)).toBeTruthy();
  });

  it('says where the far field of the expected opening begins', async () => {
    renderScreen(<BenchForm bench={bench} save={post(addBench)} />);
    const expected = screen.getByRole('textbox', { name: 'Largest opening expected in µm' });
    await userEvent.clear(expected);
    await userEvent.type(expected, '500');
    // (250 µm)² / (632.8 nm · 0.1) = 988 mm: Fresnel number 0.1, common practice, no source.
    expect(screen.getByText(/far field begins at 988\smm/)).toBeTruthy();
  });
});

describe('the sign-in form', () => {
  it('says at the password that it is not right, empties it and keeps the address', async () => {
    refuseEveryCall('wrong-credentials', 'E-mail or password is not right. Try again.');
    const tries: boolean[] = [];
    renderScreen(<SignInForm demoAccounts={[]} onTry={(refused) => tries.push(refused)} />);
    await userEvent.type(screen.getByLabelText('E-mail'), 'a@example.org');
    await userEvent.type(screen.getByLabelText('Password'), 'wrong');
    await userEvent.click(screen.getByRole('button', { name: 'Sign in' }));
    const password = screen.getByLabelText<HTMLInputElement>('Password');
    await waitFor(() => expect(sentenceAt(password)).toBe('E-mail or password is not right. Try again.'));
    expect(password.value).toBe('');
    expect(screen.getByLabelText<HTMLInputElement>('E-mail').value).toBe('a@example.org');
    expect(tries).toEqual([true]);
  });

  it('shows what the server says about the address at the address', async () => {
    refuseEveryCall('invalid-input', 'Wrong.', [{ pointer: '#/email', detail: 'This address is odd.' }]);
    renderScreen(<SignInForm demoAccounts={[]} onTry={() => {}} />);
    await userEvent.type(screen.getByLabelText('E-mail'), 'a');
    await userEvent.type(screen.getByLabelText('Password'), 'b');
    await userEvent.click(screen.getByRole('button', { name: 'Sign in' }));
    await waitFor(() => expect(sentenceAt(screen.getByLabelText('E-mail'))).toBe('This address is odd.'));
  });

  it('says that the server cannot be reached and keeps the address', async () => {
    vi.stubGlobal('fetch', () => Promise.reject(new TypeError('network')));
    renderScreen(<SignInForm demoAccounts={[]} onTry={() => {}} />);
    await userEvent.type(screen.getByLabelText('E-mail'), 'a@example.org');
    await userEvent.type(screen.getByLabelText('Password'), 'b');
    await userEvent.click(screen.getByRole('button', { name: 'Sign in' }));
    expect((await screen.findByRole('alert')).textContent).toContain('The server cannot be reached');
    expect(screen.getByLabelText<HTMLInputElement>('E-mail').value).toBe('a@example.org');
  });
});
