// @vitest-environment jsdom
import { screen } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { useState } from 'react';
import { describe, expect, it } from 'vitest';
import { CandidateList } from '#src/features/identifications/candidate-list.tsx';
import { ReviewDecision } from '#src/features/matches/review-decision.tsx';
import { refuseEveryCall, renderScreen } from '#tests/client/render-screen.tsx';
import { signatureMeanings, type Match } from '#shared/contracts/matches.ts';
import type { Candidate } from '#shared/contracts/identifications.ts';

const pinhole = (um: number, probability: number): Candidate => ({
  family: 'pinhole',
  model: `disc-${um}`,
  values: { diameter: um * 1e-6 },
  dimensions: { diameter: { value: um * 1e-6, uImage: 1e-8, uSetup: 1e-7, u: 1e-7, bound: null } },
  orientation: null,
  orientationPeriod: null,
  probability,
  reducedChiSquare: 1.06,
  fit: {
    values: [um * 1e-6],
    center: { x: 1, y: 2 },
    amplitude: 1,
    background: { offset: 0, slopeX: 0, slopeY: 0 },
    blurVariance: 0,
  },
});

const match = { id: '3b6f2a2e-8f0a-4a5e-9a64-0f6f3f1f9c11', candidate: pinhole(100, 1) } as Match;

describe('the decision on a match', () => {
  it('shows what each signature means', async () => {
    refuseEveryCall('wrong-state', 'Not now.');
    renderScreen(<ReviewDecision match={match} />);
    expect(screen.getByText(signatureMeanings.confirm)).toBeTruthy();
    await userEvent.click(screen.getByLabelText('Reject'));
    expect(screen.getByText(signatureMeanings.reject)).toBeTruthy();
  });

  it('wants a reason where it is sent back, before anything is sent', async () => {
    const fetched = refuseEveryCall('wrong-state', 'Not now.');
    renderScreen(<ReviewDecision match={match} />);
    await userEvent.click(screen.getByLabelText('Return to the analyst'));
    await userEvent.type(screen.getByLabelText('Your password again'), 'a password');
    await userEvent.click(screen.getByRole('button', { name: 'Sign and send back' }));
    await screen.findByText('Say why, so that the analyst knows what to do.');
    expect(fetched.mock.calls.some(([, init]) => init?.method === 'POST')).toBe(false);
  });

  it('puts a wrong password to its field and keeps the reason', async () => {
    refuseEveryCall('wrong-password', 'Nothing was signed.', [
      { pointer: '#/password', detail: 'This is not your password. Nothing was signed.' },
    ]);
    renderScreen(<ReviewDecision match={match} />);
    await userEvent.type(screen.getByLabelText(/^Remark/), 'Clear.');
    await userEvent.type(screen.getByLabelText('Your password again'), 'wrong');
    await userEvent.click(screen.getByRole('button', { name: 'Sign and confirm' }));
    await screen.findByText('This is not your password. Nothing was signed.');
    expect(screen.getByLabelText('Your password again').getAttribute('aria-invalid')).toBe('true');
    expect(screen.getByLabelText<HTMLTextAreaElement>(/^Remark/).value).toBe('Clear.');
  });
});

describe('the ranked candidates', () => {
  function Chosen() {
    const [chosen, setChosen] = useState(0);
    return (
      <CandidateList
        candidates={[pinhole(100, 0.995), pinhole(120, 0.004)]}
        chosen={chosen}
        onChoose={setChosen}
        claimed
      />
    );
  }

  it('are chosen one at a time and never printed as certain or impossible', async () => {
    renderScreen(<Chosen />);
    const [first, second] = screen.getAllByRole<HTMLInputElement>('radio');
    expect(first.checked).toBe(true);
    await userEvent.click(second);
    expect(second.checked).toBe(true);
    expect(first.checked).toBe(false);
    expect(screen.getByText(/over 99\s%/)).toBeTruthy();
    expect(screen.getByText(/under 1\s%/)).toBeTruthy();
  });
});
