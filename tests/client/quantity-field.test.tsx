// @vitest-environment jsdom
import { screen } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { useState } from 'react';
import { describe, expect, it } from 'vitest';
import type { TypedNumber } from '#src/ui/number-input.tsx';
import { QuantityField } from '#src/ui/quantity-field.tsx';
import { renderScreen } from '#tests/client/render-screen.tsx';

let seen: { value: TypedNumber; u: TypedNumber };

function Distance({ start }: { start: TypedNumber }) {
  const [value, setValue] = useState(start);
  const [u, setU] = useState<TypedNumber>(null);
  seen = { value, u };
  return (
    <>
      <QuantityField label="Distance" unit="mm" value={value} onValue={setValue} u={u} onU={setU} />
      <button onClick={() => setValue(0.5)}>half a metre</button>
    </>
  );
}

const value = () => screen.getByRole<HTMLInputElement>('textbox', { name: 'Distance in mm' });
const uncertainty = () => screen.getByRole('textbox', { name: 'Distance, standard uncertainty in mm' });

describe('a quantity field', () => {
  it('shows SI in the unit of the reader, without the dust of binary fractions', () => {
    renderScreen(<QuantityField label="Wavelength" unit="nm" value={632.8e-9} onValue={() => {}} />);
    expect(screen.getByRole<HTMLInputElement>('textbox').value).toBe('632.8');
  });

  it('hands out metres for what was typed in millimetres, the uncertainty too', async () => {
    renderScreen(<Distance start={null} />);
    await userEvent.type(value(), '850');
    await userEvent.type(uncertainty(), '0.3');
    expect(seen).toEqual({ value: 0.85, u: 0.0003 });
  });

  it('takes a comma for a decimal point and leaves the text as typed', async () => {
    renderScreen(<Distance start={null} />);
    await userEvent.type(value(), '850,5');
    expect(seen.value).toBe(0.8505);
    expect(value().value).toBe('850,5');
  });

  it('keeps what is no number in the field, says so and hands out no number', async () => {
    renderScreen(<Distance start={0.85} />);
    await userEvent.clear(value());
    await userEvent.type(value(), '85x');
    expect(value().value).toBe('85x');
    expect(value()).toHaveProperty('ariaInvalid', 'true');
    expect(screen.getByText(/not a number/)).toBeTruthy();
    expect(seen.value).toBeNaN();
  });

  it('is null when emptied', async () => {
    renderScreen(<Distance start={0.85} />);
    await userEvent.clear(value());
    expect(seen.value).toBeNull();
  });

  it('follows a value that is set from outside', async () => {
    renderScreen(<Distance start={0.85} />);
    await userEvent.type(value(), '1');
    await userEvent.click(screen.getByRole('button'));
    expect(value().value).toBe('500');
  });
});
