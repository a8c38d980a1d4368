import { describe, expect, it } from 'vitest';
import type { ApertureFamily, ApertureValues, FarFieldModel } from '#shared/apertures/family.ts';
import { families, familyIds, familyOf } from '#shared/apertures/registry.ts';
import { farField } from '#shared/physics/far-field.ts';
import { coordinate } from '#shared/physics/grid.ts';
import { coverage } from '#shared/physics/raster.ts';
import { seededRandom } from '#shared/physics/random.ts';
import { sinc } from '#shared/physics/sinc.ts';

/** Size over which a family's example is drawn: unresolved lengths get a beam of this width. */
function stage(family: ApertureFamily, values: ApertureValues): number {
  return 1.6 * family.extent(values);
}

function evaluate(model: FarFieldModel, fitted: ArrayLike<number>, u: number[], v: number[]): Float64Array {
  const out = new Float64Array(u.length);
  model.intensity(fitted, Float64Array.from(u), Float64Array.from(v), out, u.length);
  return out;
}

/** Fitted values of an example in one model, with nuisances set to `beam`; null where the model is not the example's own. */
function fittedFor(family: ApertureFamily, model: FarFieldModel, values: ApertureValues, beam: number) {
  const open = Object.values(values).some((value) => value === null);
  const parameters = new Set(family.parameters.map((p) => p.key));
  const lit = model.keys.some((key) => !parameters.has(key));
  if (open && !lit) return null;
  return model.fromFamily(values).map((value, i) => (parameters.has(model.keys[i]) ? value : beam));
}

/** Largest |transform of the mask − closed form| over the first orders, both 1 on the axis. */
function disagreement(
  family: ApertureFamily,
  model: FarFieldModel,
  values: ApertureValues,
  cells: number,
): number {
  const size = stage(family, values);
  const n = 4 * cells;
  const grid = { n, spacing: size / cells };
  const turn = 0.4;
  const [c, s] = [Math.cos(turn), Math.sin(turn)];
  const beam = 0.8 * size;
  const fitted = fittedFor(family, model, values, beam)!;
  const lit = fitted.some((_, i) => !family.parameters.some((p) => p.key === model.keys[i]));
  const shape = lit
    ? Object.fromEntries(
        Object.entries(values).map(([k, x]) => [
          k,
          family.parameters.find((p) => p.key === k)?.nullable ? null : x,
        ]),
      )
    : values;
  const mask = coverage((x, y) => family.distance(shape, c * x + s * y, c * y - s * x), grid);
  if (lit)
    for (let j = 0; j < n; j++)
      for (let i = 0; i < n; i++) {
        const along = c * coordinate(i, n, grid.spacing) + s * coordinate(j, n, grid.spacing);
        mask[j * n + i] *= Math.exp(-(((2 * along) / beam) ** 2));
      }
  const { intensity, spacing } = farField(mask, grid);
  let worst = 0;
  const reach = 24;
  const u: number[] = [];
  const v: number[] = [];
  const seen: number[] = [];
  const cell: number[] = [];
  for (let j = -reach; j <= reach; j++)
    for (let i = -reach; i <= reach; i++) {
      u.push((c * i + s * j) * spacing);
      v.push((c * j - s * i) * spacing);
      seen.push(intensity[(n / 2 + j) * n + n / 2 + i]);
      cell.push((sinc(i / n) * sinc(j / n)) ** 2);
    }
  // Coverage is the opening averaged over a cell, which multiplies its transform by the cell's own.
  evaluate(model, fitted, u, v).forEach((value, k) => {
    worst = Math.max(worst, Math.abs(seen[k] - value * cell[k]));
  });
  return worst;
}

describe('the registry', () => {
  it('names every family once and finds it by its name', () => {
    expect(new Set(familyIds).size).toBe(families.length);
    for (const id of familyIds) expect(familyOf(id).id).toBe(id);
    expect(() => familyOf('keyhole')).toThrow('keyhole');
  });

  it('links families only to models that exist, with as many starts as the model has values', () => {
    for (const family of families)
      for (const kin of family.kin) {
        const model = familyOf(kin.family).models.find((m) => m.id === kin.model);
        expect(model, `${family.id} → ${kin.family}`).toBeDefined();
        for (const values of family.examples) {
          const start = kin.start(values);
          if (start) expect(start.values).toHaveLength(model!.keys.length);
          for (const value of start?.values ?? []) expect(value).toBeGreaterThan(0);
        }
      }
  });

  it('gives a simpler family a way from every richer one that contains it', () => {
    for (const [richer, simpler] of [
      ['ellipse', 'pinhole'],
      ['slot', 'pinhole'],
      ['slot', 'ellipse'],
      ['slot', 'rectangle'],
      ['rectangle', 'square'],
      ['doubleSlit', 'slit'],
    ])
      expect(familyOf(richer).kin.map((k) => k.family)).toContain(simpler);
  });
});

describe.each(families.map((family) => ({ id: family.id, family })))('$id', ({ family }) => {
  it('has at least three proper examples inside its bounds', () => {
    expect(family.examples.length).toBeGreaterThanOrEqual(3);
    for (const values of family.examples) {
      expect(family.proper(values)).toBe(true);
      expect(Object.keys(values).sort()).toEqual(family.parameters.map((p) => p.key).sort());
      for (const p of family.parameters) {
        const value = values[p.key];
        if (value === null) expect(p.nullable).toBe(true);
        else expect(value >= p.min && value <= p.max).toBe(true);
      }
    }
  });

  it('returns the values it was given through every one of its models', () => {
    for (const model of family.models)
      for (const values of family.examples) {
        const fitted = fittedFor(family, model, values, 1e-3);
        if (!fitted) continue;
        expect(fitted).toHaveLength(model.keys.length);
        const back = model.toFamily(fitted);
        for (const p of family.parameters) if (back[p.key] !== null) expect(back[p.key]).toBe(values[p.key]);
      }
  });

  it('covers the area it states', () => {
    for (const values of family.examples) {
      const area = family.area(values);
      if (area === null) {
        expect(Object.values(values).includes(null) || family.id === 'slit').toBe(true);
        continue;
      }
      const n = 400;
      const spacing = (1.1 * family.extent(values)) / n;
      const mask = coverage((x, y) => family.distance(values, x, y), { n, spacing });
      const sampled = mask.reduce((a, b) => a + b, 0) * spacing * spacing;
      // Straight-edge ramp on cells of 1/1600 of the extent: error of order perimeter · fine²/extent.
      expect(Math.abs(sampled / area - 1)).toBeLessThan(2e-4);
    }
  });

  it('measures distance in metres near its edge: negative inside, slope one across', () => {
    const random = seededRandom(5);
    for (const values of family.examples) {
      const size = family.extent(values);
      const h = 1e-5 * size;
      let met = 0;
      for (let k = 0; k < 4000; k++) {
        const x = (random() - 0.5) * size;
        const y = (random() - 0.5) * size;
        const d = family.distance(values, x, y);
        if (Math.abs(d) > 0.004 * size) continue;
        const gx = (family.distance(values, x + h, y) - family.distance(values, x - h, y)) / (2 * h);
        const gy = (family.distance(values, x, y + h) - family.distance(values, x, y - h)) / (2 * h);
        // The skeleton, where the nearest edge changes, has no slope; near an edge only corners are like that.
        if (Math.abs(Math.hypot(gx, gy) - 1) < 0.05) met += 1;
        else expect(Math.hypot(gx, gy)).toBeLessThan(1.05);
      }
      expect(met).toBeGreaterThan(10);
    }
  });

  it('draws its outline where the distance is zero, counter-clockwise and of the stated extent', () => {
    for (const values of family.examples) {
      const drawn = 5 * family.extent(values);
      const open = family.area(values) === null;
      let twice = 0;
      for (const ring of family.outline(values, drawn)) {
        ring.forEach(([x, y], i) => {
          const [nx, ny] = ring[(i + 1) % ring.length];
          twice += x * ny - nx * y;
          expect(Math.abs(family.distance(values, x, y))).toBeLessThan(1e-9 * drawn + (open ? 1e-12 : 0));
        });
      }
      expect(twice).toBeGreaterThan(0);
      const area = family.area(values);
      // A ring of 64 and more chords leaves out less than 0.3 % of a round.
      if (area !== null) expect(Math.abs(twice / 2 / area - 1)).toBeLessThan(3e-3);
    }
  });

  it('has the same intensity at opposite points and after its period, and not after half of it', () => {
    const random = seededRandom(9);
    for (const model of family.models)
      for (const values of family.examples) {
        const size = family.extent(values);
        const fitted = fittedFor(family, model, values, 2 * size);
        if (!fitted) continue;
        const u = Array.from({ length: 400 }, () => ((random() - 0.5) * 4) / size);
        const v = Array.from({ length: 400 }, () => ((random() - 0.5) * 4) / size);
        const turned = (angle: number) => {
          const [c, s] = [Math.cos(angle), Math.sin(angle)];
          return evaluate(
            model,
            fitted,
            u.map((x, i) => c * x - s * v[i]),
            v.map((y, i) => c * y + s * u[i]),
          );
        };
        const here = turned(0);
        const gap = (angle: number) =>
          Math.max(...turned(angle).map((value, i) => Math.abs(value - here[i])));
        expect(gap(Math.PI)).toBeLessThan(1e-9);
        // Round: any turn at all.
        expect(gap(family.rotationPeriod ?? 1.234)).toBeLessThan(1e-9);
        if (family.rotationPeriod !== null) expect(gap(family.rotationPeriod / 2)).toBeGreaterThan(0.01);
      }
  });

  it('is 1 on the axis and nowhere more', () => {
    for (const model of family.models)
      for (const values of family.examples) {
        const size = family.extent(values);
        const fitted = fittedFor(family, model, values, 2 * size);
        if (!fitted) continue;
        const at = Array.from({ length: 300 }, (_, i) => (i * 0.05) / size);
        expect(evaluate(model, fitted, [0], [0])[0]).toBeCloseTo(1, 6);
        expect(
          Math.max(
            ...evaluate(model, fitted, at, at),
            ...evaluate(
              model,
              fitted,
              at,
              at.map((x) => -x / 3),
            ),
          ),
        ).toBeLessThan(1 + 1e-6);
      }
  });

  it('keeps its pattern when opening and frequencies are scaled against each other', () => {
    for (const model of family.models)
      for (const { model: id, values: fitted } of family.unitShapes) {
        if (id !== model.id) continue;
        const at = Array.from({ length: 40 }, (_, i) => i * 0.13);
        const across = at.map((x) => 0.7 * x);
        const unit = evaluate(model, fitted, at, across);
        const small = evaluate(
          model,
          fitted.map((value) => value * 1e-4),
          at.map((x) => x * 1e4),
          across.map((x) => x * 1e4),
        );
        small.forEach((value, i) => expect(Math.abs(value - unit[i])).toBeLessThan(1e-9));
      }
  });

  it('offers unit shapes of every model for the search', () => {
    expect(new Set(family.unitShapes.map((shape) => shape.model))).toEqual(
      new Set(family.models.map((m) => m.id)),
    );
  });

  it.each(family.models.map((model) => ({ id: model.id, model })))(
    'agrees with the transform of its own mask in model $id, ever better on finer grids',
    ({ model }) => {
      for (const values of family.examples.slice(0, 2)) {
        const own = fittedFor(family, model, values, 1) ? values : family.examples.at(-1)!;
        const coarse = disagreement(family, model, own, 32);
        const fine = disagreement(family, model, own, 128);
        // Aliasing of a hard edge falls with the square of the cell or faster: 16 times for a quarter of the cell; half
        // of that is asked, down to the rounding of the tables.
        expect(fine).toBeLessThan(Math.max(coarse / 8, 2e-5));
        expect(fine).toBeLessThan(2e-4);
      }
    },
  );
});
