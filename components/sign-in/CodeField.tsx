import { Field } from '@/components/ui/Field';

/** Where the code of the second factor is typed. A new one is mounted for each try, so it is empty then. */
export function CodeField() {
  return <Field label="code of your authenticator, or a recovery code" name="code" autoComplete="one-time-code" autoCapitalize="none" spellCheck={false} maxLength={16} autoFocus tall hint="six digits that change every 30 s" />;
}
