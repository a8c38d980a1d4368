import { describe, expect, it } from 'vitest';
import { besselJ0, besselJ1, besselY1 } from '#shared/physics/bessel.ts';
import { jinc } from '#shared/physics/jinc.ts';
import { obroundMiddle, obroundMiddleByQuadrature } from '#shared/physics/obround.ts';
import { cosPi, sinPi, sinc } from '#shared/physics/sinc.ts';
import { tabulatedY1, y1Table } from '#shared/physics/y1-table.ts';

describe('Bessel functions', () => {
  // Abramowitz & Stegun, Table 9.1; DLMF 10.
  it.each([
    [0.5, 0.938469807241, 0.242268457675],
    [1, 0.765197686558, 0.440050585745],
    [2, 0.223890779141, 0.576724807757],
    [3, -0.260051954902, 0.339058958526],
    [5, -0.177596771314, -0.327579137591],
    [10, -0.245935764451, 0.043472746169],
  ])('agree with the table at x = %d', (x, j0, j1) => {
    expect(Math.abs(besselJ0(x) - j0)).toBeLessThan(6e-13);
    expect(Math.abs(besselJ1(x) - j1)).toBeLessThan(6e-13);
    expect(besselJ1(-x)).toBe(-besselJ1(x));
  });

  it('vanish at the tabulated zeros of J0 and J1', () => {
    // Abramowitz & Stegun, Table 9.5.
    for (const zero of [2.4048255577, 5.5200781103, 8.6537279129, 11.791534439, 14.9309177085])
      expect(Math.abs(besselJ0(zero))).toBeLessThan(5e-11);
    for (const zero of [
      3.8317059702, 7.0155866698, 10.1734681351, 13.3236919363, 16.4706300509, 19.6158585105,
    ])
      expect(Math.abs(besselJ1(zero))).toBeLessThan(5e-11);
  });

  it('satisfy the derivative rule J0′ = −J1 on both sides of the change of method', () => {
    // DLMF 10.6.3; Richardson's combination of central differences, error of order h⁶.
    for (const x of [0.3, 4, 12, 24, 29.5, 30.5, 31, 60, 200, 600]) {
      const d = (h: number) => (besselJ0(x + h) - besselJ0(x - h)) / (2 * h);
      const h = 0.04;
      expect(Math.abs((64 * d(h / 4) - 20 * d(h / 2) + d(h)) / 45 + besselJ1(x))).toBeLessThan(2e-11);
    }
  });

  it('agree with Bessel’s integral, an independent definition', () => {
    // DLMF 10.9.2; the trapezium rule is exact to J_{2n}(x) for periodic integrands.
    for (const x of [0.1, 1, 7.7, 29.99, 30.01, 80]) {
      const n = 200;
      let j0 = 0;
      let j1 = 0;
      for (let k = 0; k < n; k++) {
        const t = (Math.PI * (k + 0.5)) / n;
        j0 += Math.cos(x * Math.sin(t)) / n;
        j1 += Math.cos(t - x * Math.sin(t)) / n;
      }
      expect(Math.abs(besselJ0(x) - j0)).toBeLessThan(3e-15);
      expect(Math.abs(besselJ1(x) - j1)).toBeLessThan(3e-15);
    }
  });

  it('J and Y keep their Wronskian, which ties Y1 to J1', () => {
    // DLMF 10.5.2: J1 Y0 − J0 Y1 = 2/(πx) and Y0 = Y1/x + Y1′ (10.6.2).
    for (const x of [9, 20, 75, 300]) {
      const h = 1e-2;
      const slope =
        (8 * (besselY1(x + h) - besselY1(x - h)) - besselY1(x + 2 * h) + besselY1(x - 2 * h)) / (12 * h);
      const y0 = besselY1(x) / x + slope;
      expect(Math.abs(besselJ1(x) * y0 - besselJ0(x) * besselY1(x) - 2 / (Math.PI * x))).toBeLessThan(2e-6);
    }
  });
});

describe('the tables of the closed forms', () => {
  it('give 2J1(x)/x within 1e-9 wherever it is asked, table or not', () => {
    let worst = 0;
    for (let x = 0.00137; x < 700; x += 0.0471)
      worst = Math.max(worst, Math.abs(jinc(x) - (2 * besselJ1(x)) / x), Math.abs(jinc(-x) - jinc(x)));
    expect(worst).toBeLessThan(1e-9);
    expect(jinc(0)).toBe(1);
  });

  it('give Y1 within 1e-7 from 8 on', () => {
    const t = y1Table();
    for (let x = 8; x < 700; x += 0.0713)
      expect(Math.abs(tabulatedY1(t, x) - besselY1(x))).toBeLessThan(1e-7);
  });

  it('give sin πt, cos πt and sinc within 1e-13', () => {
    for (let t = -40; t < 40; t += 0.0137) {
      expect(Math.abs(sinPi(t) - Math.sin(Math.PI * t))).toBeLessThan(1e-13);
      expect(Math.abs(cosPi(t) - Math.cos(Math.PI * t))).toBeLessThan(1e-13);
    }
    for (const t of [0, 1e-9, 9e-5, 1.1e-4, -0.3])
      expect(Math.abs(sinc(t) - (t === 0 ? 1 : Math.sin(Math.PI * t) / (Math.PI * t)))).toBeLessThan(1e-13);
    expect(Math.abs(sinc(3))).toBe(0);
  });

  it('give the obround integral within a millionth of its peak, in every regime and across their borders', () => {
    let worst = 0;
    for (const rho of [0, 0.07, 1.3, 5, 7.99, 8.01, 12, 27, 60, 140, 330, 640, 700])
      for (let k = 0; k <= 60; k++) {
        const angle = (Math.PI / 2) * (1 - (1 - k / 60) ** 2);
        const a = rho * Math.cos(angle);
        const b = rho * Math.sin(angle);
        const exact = obroundMiddleByQuadrature(a, b, Math.ceil(0.6 * rho + 30));
        worst = Math.max(
          worst,
          Math.abs(obroundMiddle(a, b) - exact),
          Math.abs(obroundMiddle(-a, -b) - exact),
        );
      }
    expect(worst).toBeLessThan(2e-6);
  });
});
