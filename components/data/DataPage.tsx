'use client';

import { Exports } from './Exports';
import { ImportFile } from './ImportFile';
import { Imports } from './Imports';

/** Data in and out: take all of it along, bring old logs and batches in, take an import out again. */
export function DataPage() {
  return (
    <>
      <Exports />
      <ImportFile />
      <Imports />
    </>
  );
}
