import { useFormContext } from 'react-hook-form';
import type { z } from 'zod';
import type { ExamSheet, examSheet } from '@/lib/exams/model';

/** What the sheet's fields hold before they are read. */
export type SheetFields = z.input<typeof examSheet>;
export const useSheet = () => useFormContext<SheetFields, unknown, ExamSheet>();

/** Registers a number: empty is "not a number", which the schema refuses in words. */
export const asNumber = { valueAsNumber: true } as const;
/** Registers a number that may be left empty. */
export const asNumberOrNull = { setValueAs: (value: unknown) => (value === '' || value === null || value === undefined ? null : Number(value)) };
