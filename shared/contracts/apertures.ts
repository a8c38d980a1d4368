import { z } from 'zod';
import { familyIds, familyOf } from '#shared/apertures/registry.ts';

export const familyIdSchema = z.enum(familyIds as [string, ...string[]]);

const valuesSchema = z.record(z.string(), z.number().nullable());

/** A family with a value for each of its parameters, in metres (counts as they are). */
export const apertureSchema = z
  .object({ family: familyIdSchema, values: valuesSchema })
  .superRefine((aperture, ctx) => {
    const family = familyOf(aperture.family);
    const known = new Set(family.parameters.map((p) => p.key));
    for (const key of Object.keys(aperture.values))
      if (!known.has(key))
        ctx.addIssue({
          code: 'custom',
          path: ['values', key],
          message: `A ${family.label} has no such size.`,
        });
    for (const p of family.parameters) {
      const value = aperture.values[p.key];
      const label = p.label.toLowerCase();
      if (value === undefined || (value === null && !p.nullable))
        ctx.addIssue({ code: 'custom', path: ['values', p.key], message: `Enter the ${label}.` });
      else if (value !== null && !(value >= p.min && value <= p.max))
        ctx.addIssue({
          code: 'custom',
          path: ['values', p.key],
          message:
            p.kind === 'length'
              ? `The ${label} must lie between ${p.min * 1e6} and ${p.max * 1e6} µm.`
              : `The ${label} must lie between ${p.min} and ${p.max}.`,
        });
    }
  });
