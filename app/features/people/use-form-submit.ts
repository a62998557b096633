import { zodResolver } from '@hookform/resolvers/zod';
import { useForm, type DefaultValues, type FieldValues } from 'react-hook-form';
import type { ZodType } from 'zod';
import { showProblem } from '../../lib/form.ts';

/**
 * A form checked by the schema that the server uses too; what the server refuses stands beside its field.
 * `submit` runs with what the schema made of the fields.
 */
export function useFormSubmit<Input extends FieldValues, Output extends FieldValues>(options: {
  readonly schema: ZodType<Output, Input>;
  readonly defaultValues: DefaultValues<Input>;
  readonly submit: (values: Output) => Promise<void>;
}) {
  const form = useForm<Input, unknown, Output>({
    resolver: zodResolver(options.schema),
    defaultValues: options.defaultValues,
  });
  const onSubmit = form.handleSubmit(async (values) => {
    try {
      await options.submit(values);
    } catch (error) {
      if (!showProblem(error, form.setError, Object.keys(form.getValues()))) throw error;
    }
  });
  const { errors, isSubmitting, isSubmitSuccessful } = form.formState;
  return {
    form,
    onSubmit,
    isBusy: isSubmitting,
    isDone: isSubmitSuccessful && Object.keys(errors).length === 0,
    rootError: errors.root?.message,
    /** The message beside a field, if any. */
    errorOf: (field: keyof Input & string): string | undefined => {
      const message = errors[field]?.message;
      return typeof message === 'string' ? message : undefined;
    },
  };
}
