import { zodResolver } from '@hookform/resolvers/zod';
import { useState } from 'react';
import { useForm, type DefaultValues, type FieldValues, type Resolver } from 'react-hook-form';
import type { z } from 'zod';
import { asProblem, type ApiProblem } from '#src/lib/problem.ts';
import { problemToForm } from '#src/lib/problem-to-form.ts';

interface RecordForm<In extends FieldValues, Out extends FieldValues> {
  schema: z.ZodType<Out, In>;
  defaults: DefaultValues<In>;
  /** Paths, or beginnings of paths, that the form shows. */
  fields: readonly string[];
  /** Stores what was typed; throws `ApiProblem`. */
  save: (values: Out) => Promise<void>;
  /** Takes out what was left empty on purpose, before the contract judges. */
  tidy?: (values: In) => In;
}

/**
 * A form over a contract: judged by the same schema as on the server, saved once at a time, the server's sentences at
 * their fields. What was typed stays, whatever happens.
 */
export function useRecordForm<In extends FieldValues, Out extends FieldValues>(record: RecordForm<In, Out>) {
  const { schema, defaults, fields, save, tidy } = record;
  const judge: Resolver<In, unknown, Out> = zodResolver<In, unknown, Out>(schema);
  const form = useForm<In, unknown, Out>({
    defaultValues: defaults,
    resolver: (values, context, options) => judge(tidy ? tidy(values) : values, context, options),
  });
  const [refused, setRefused] = useState<{ problem: ApiProblem; more: string[] } | null>(null);
  const hasField = (path: string) => fields.some((field) => path === field || path.startsWith(`${field}.`));
  const submit = form.handleSubmit(async (values) => {
    setRefused(null);
    try {
      await save(values);
    } catch (error) {
      const problem = asProblem(error);
      setRefused({ problem, more: problemToForm(problem, form, hasField) });
    }
  });
  return {
    form,
    submit,
    busy: form.formState.isSubmitting,
    problem: refused?.problem ?? null,
    more: refused?.more ?? [],
  };
}
