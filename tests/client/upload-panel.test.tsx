// @vitest-environment jsdom
import { screen, waitFor } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { beforeEach, describe, expect, it, vi } from 'vitest';
import { UploadPanel } from '#src/features/exposures/upload-panel.tsx';
import { problemText, renderScreen } from '#tests/client/render-screen.tsx';
import type { Bench } from '#shared/contracts/benches.ts';

/** An upload in flight; the test decides how it ends. */
class FakeRequest {
  static made: FakeRequest[] = [];
  upload: { onprogress?: (e: object) => void } = {};
  onload?: () => void;
  onerror?: () => void;
  onabort?: () => void;
  status = 0;
  responseText = '';
  form = new FormData();
  open() {}
  send(form: FormData) {
    this.form = form;
    FakeRequest.made.push(this);
  }
  abort() {
    this.onabort?.();
  }
  refuse(status: number, text: string) {
    this.status = status;
    this.responseText = text;
    this.onload?.();
  }
}

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
  darkLevel: null,
  mirrored: false,
  version: 1,
  createdAt: '2026-01-01T00:00:00.000Z',
  createdBy: { id: '0b6f2a2e-8f0a-4a5e-9a64-0f6f3f1f9c11', name: 'A. Person' },
  can: { edit: true },
};
const picture = (name: string) => new File([new Uint8Array(100)], name, { type: 'image/png' });
const input = () => screen.getByLabelText<HTMLInputElement>('Pictures of the pattern');

beforeEach(() => {
  FakeRequest.made = [];
  vi.stubGlobal('XMLHttpRequest', FakeRequest);
});

describe('the upload panel', () => {
  it('keeps a refused file in its place with the server’s sentence, and sends it again', async () => {
    renderScreen(<UploadPanel caseId="c" benches={[bench]} />);
    await userEvent.upload(input(), [picture('a.png'), picture('b.png')]);
    await waitFor(() => expect(FakeRequest.made).toHaveLength(2));
    FakeRequest.made[0].refuse(
      422,
      problemText('picture-truncated', 'The file ends early: 4.1 of 8.4 MB. Send it again.'),
    );
    const refused = await screen.findByRole('alert');
    expect(refused.textContent).toContain('a.png');
    expect(refused.textContent).toContain('The file ends early: 4.1 of 8.4 MB.');
    expect(screen.getByRole('progressbar', { name: 'Sending b.png' })).toBeTruthy();
    await userEvent.click(screen.getByRole('button', { name: 'Send again a.png' }));
    await waitFor(() => expect(FakeRequest.made).toHaveLength(3));
    expect((FakeRequest.made[2].form.get('file') as File).name).toBe('a.png');
    expect(FakeRequest.made[2].form.get('benchId')).toBe(bench.id);
  });

  it('takes a refused file off the list when it is left out', async () => {
    renderScreen(<UploadPanel caseId="c" benches={[bench]} />);
    await userEvent.upload(input(), picture('a.png'));
    await waitFor(() => expect(FakeRequest.made).toHaveLength(1));
    FakeRequest.made[0].refuse(415, problemText('not-a-picture', 'Nothing was stored.'));
    await userEvent.click(await screen.findByRole('button', { name: 'Leave out a.png' }));
    expect(screen.queryByText('a.png')).toBeNull();
  });

  it('says in a sentence that the line broke, and keeps the file', async () => {
    renderScreen(<UploadPanel caseId="c" benches={[bench]} />);
    await userEvent.upload(input(), picture('a.png'));
    await waitFor(() => expect(FakeRequest.made).toHaveLength(1));
    FakeRequest.made[0].onerror?.();
    expect((await screen.findByRole('alert')).textContent).toContain('The server cannot be reached');
  });

  it('refuses an empty file without sending it', async () => {
    renderScreen(<UploadPanel caseId="c" benches={[bench]} />);
    await userEvent.upload(input(), new File([], 'empty.png', { type: 'image/png' }));
    expect((await screen.findByRole('alert')).textContent).toContain('The file is empty');
    expect(FakeRequest.made).toHaveLength(0);
  });

  it('asks for the bench first, sends nothing without it, and shows the values once it is chosen', async () => {
    const other = { ...bench, id: '3b6f2a2e-8f0a-4a5e-9a64-0f6f3f1f9c11', name: 'Lens' };
    renderScreen(<UploadPanel caseId="c" benches={[bench, other]} />);
    await userEvent.upload(input(), picture('a.png'));
    expect(screen.getByText(/Choose the bench first/)).toBeTruthy();
    expect(FakeRequest.made).toHaveLength(0);
    await userEvent.selectOptions(screen.getByRole('combobox'), 'Lens');
    expect(screen.getByText('850.0')).toBeTruthy();
  });

  it('has the laser cautions in view', () => {
    renderScreen(<UploadPanel caseId="c" benches={[bench]} />);
    expect(screen.getByText(/Never look into the beam/)).toBeTruthy();
    expect(screen.getByText(/laser safety officer/)).toBeTruthy();
  });
});
