// @vitest-environment jsdom
import { fireEvent, screen } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { describe, expect, it, vi } from 'vitest';
import { groupOf } from '#src/features/cases/case-groups.ts';
import { useKeys } from '#src/lib/keys.ts';
import { ApertureSketch } from '#src/ui/aperture-sketch.tsx';
import { Button } from '#src/ui/button.tsx';
import { colourMap, labOf } from '#src/ui/colour-maps.ts';
import { KeyLine } from '#src/ui/key-line.tsx';
import { StateDisc } from '#src/ui/state-disc.tsx';
import { VerdictMark } from '#src/ui/verdict-mark.tsx';
import { renderScreen } from '#tests/client/render-screen.tsx';
import { caseStageSchema } from '#shared/contracts/cases.ts';

describe('a stage', () => {
  it.each(caseStageSchema.options)('%s has its word on the disc and on the mark', (stage) => {
    renderScreen(
      <>
        <StateDisc stage={stage} thumbnail={null} />
        <VerdictMark stage={stage} />
      </>,
    );
    const word = screen.getByRole('img').getAttribute('aria-label') ?? '';
    expect(word.length).toBeGreaterThan(3);
    expect(screen.getByText(word)).toBeTruthy();
  });
});

function Keyed({ run }: { run: (key: string) => void }) {
  useKeys([
    { keys: 'j', label: 'next', run: () => run('j') },
    { keys: 'g w', label: 'work list', run: () => run('g w') },
    { keys: 'Enter', label: 'open', run: () => run('Enter') },
  ]);
  return (
    <>
      <input aria-label="words" />
      <button>a button</button>
      <KeyLine />
    </>
  );
}

describe('single-letter keys', () => {
  it('run their deed, two after each other too', () => {
    const run = vi.fn();
    renderScreen(<Keyed run={run} />);
    for (const key of ['j', 'g', 'w']) fireEvent.keyDown(document.body, { key });
    expect(run.mock.calls.flat()).toEqual(['j', 'g w']);
  });

  it('are off while typing', async () => {
    const run = vi.fn();
    renderScreen(<Keyed run={run} />);
    await userEvent.type(screen.getByLabelText('words'), 'jgw{Enter}');
    expect(run).not.toHaveBeenCalled();
    expect(screen.getByLabelText<HTMLInputElement>('words').value).toBe('jgw');
  });

  it('leave Enter to the control in focus', () => {
    const run = vi.fn();
    renderScreen(<Keyed run={run} />);
    fireEvent.keyDown(screen.getByText('a button'), { key: 'Enter' });
    expect(run).not.toHaveBeenCalled();
  });

  it('can be switched off, and the choice is kept', async () => {
    const run = vi.fn();
    renderScreen(<Keyed run={run} />);
    await userEvent.click(screen.getByRole('button', { name: 'all keys' }));
    await userEvent.click(screen.getByRole('checkbox', { name: 'Single-letter keys' }));
    await userEvent.click(screen.getByRole('button', { name: 'Close' }));
    fireEvent.keyDown(document.body, { key: 'j' });
    expect(run).not.toHaveBeenCalled();
    fireEvent.keyDown(document.body, { key: 'Enter' });
    expect(run.mock.calls.flat()).toEqual(['Enter']);
  });
});

describe('a button', () => {
  it('that is not ready says what it wants, stays reachable and does nothing', async () => {
    const press = vi.fn();
    renderScreen(
      <Button notYet="one verdict" onClick={press}>
        Submit
      </Button>,
    );
    const button = screen.getByRole('button', { name: 'Submit' });
    await userEvent.click(button);
    expect(press).not.toHaveBeenCalled();
    expect(button.getAttribute('aria-disabled')).toBe('true');
    expect(document.getElementById(button.getAttribute('aria-describedby') ?? '')?.textContent).toBe(
      'Wants: one verdict',
    );
  });
});

describe('the colour maps', () => {
  it.each(['magma', 'safelight'] as const)('%s grows lighter with every code, in even steps', (name) => {
    const map = colourMap(name);
    const light = Array.from(
      { length: 256 },
      (_, i) => labOf([map[3 * i], map[3 * i + 1], map[3 * i + 2]])[0],
    );
    const steps = light.slice(1).map((l, i) => l - light[i]);
    expect(Math.min(...steps)).toBeGreaterThan(0);
    expect(Math.max(...steps)).toBeLessThan(1.2);
    expect(light[255] - light[0]).toBeGreaterThan(90);
  });
});

describe('an aperture sketch', () => {
  it('says its shape and direction in words', () => {
    renderScreen(
      <ApertureSketch family="slot" values={{ length: 2e-4, width: 8e-5 }} orientation={Math.PI / 6} />,
    );
    expect(screen.getByRole('img', { name: 'Slot, long axis 30°' })).toBeTruthy();
  });
});

describe('the work list', () => {
  it('puts each case into one group by who waits on whom', () => {
    const group = (
      state: 'open' | 'in-review' | 'closed',
      stage: Parameters<typeof groupOf>[0]['stage'],
      you = false,
    ) => groupOf({ state, stage, waitsForYou: you });
    expect(group('open', 'identified', true)).toBe('wait');
    expect(group('open', 'identified')).toBe('others');
    expect(group('open', 'running', true)).toBe('running');
    expect(group('open', 'returned', true)).toBe('came-back');
    expect(group('in-review', 'in-review')).toBe('in-review');
    expect(group('in-review', 'in-review', true)).toBe('wait');
    expect(group('closed', 'confirmed')).toBe('closed');
  });
});
