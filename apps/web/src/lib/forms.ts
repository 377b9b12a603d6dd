import { notifications } from '@mantine/notifications';
import { useState } from 'react';
import { messageOf, Problem } from '../api/problem';

interface FormLike {
  setErrors(errors: Record<string, string>): void;
  getValues(): object;
}

/**
 * Shows what was refused: at the fields the problem names, and the rest as the returned sentence, to stand above the form.
 * Null when every error found its field.
 */
export function showProblem(form: FormLike, error: unknown): string | null {
  if (!(error instanceof Problem)) return messageOf(error);
  const known = Object.keys(form.getValues());
  const fields = Object.entries(error.fields);
  form.setErrors(Object.fromEntries(fields.filter(([path]) => known.includes(path))));
  const homeless = fields.filter(([path]) => !known.includes(path));
  if (homeless.length > 0) return homeless.map(([path, detail]) => `${path}: ${detail}`).join('; ');
  return fields.length > 0 ? null : error.message;
}

/** `showProblem` with the sentence kept: pass `show` to a mutation's onError, give `message` to `FormRefusal`. */
export function useProblem(form: FormLike) {
  const [message, setMessage] = useState<string | null>(null);
  return {
    message,
    show: (error: unknown) => setMessage(showProblem(form, error)),
    clear: () => setMessage(null),
  };
}

/** Says that an action outside a form failed. */
export function notifyFailure(title: string, error: unknown): void {
  notifications.show({ color: 'madder', title, message: messageOf(error), autoClose: 8_000, role: 'alert' });
}

export function notifyDone(message: string): void {
  notifications.show({ message, autoClose: 4_000, role: 'status' });
}
