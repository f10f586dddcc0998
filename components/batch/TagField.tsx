'use client';

import type { ChangeEventHandler } from 'react';
import { Field } from '@/components/ui/Field';
import { Sentence } from '@/components/ui/Sentence';
import { useBatches } from '@/lib/client/batches';
import { typedNumber } from './figures';

interface TagFieldProps {
  label: string;
  value: string;
  onChange: ChangeEventHandler<HTMLInputElement>;
  error?: string | undefined;
  /** The batch that is in the vessel already: its own tag is no other's. */
  batchId?: string | undefined;
}

/** The number on a vessel's tag, with a word where another batch at work carries it: who goes by the tag would read or pour the wrong one. */
export function TagField({ batchId, value, ...rest }: TagFieldProps) {
  const { batches } = useBatches({ state: 'working' });
  const tag = typedNumber(value);
  const other = tag === null ? undefined : batches?.find((batch) => batch.tag === tag && batch.id !== batchId);
  return <Field {...rest} value={value} inputMode="numeric" autoComplete="off" hint={other && <Sentence>{`Tag ${other.tag} is on ${other.name} too.`}</Sentence>} />;
}
