import type { FieldTrouble } from '@/components/ui/ErrorSummary';

/** What react-hook-form found, as lines that lead to their fields. */
export function troublesOf(errors: unknown, path: string): FieldTrouble[] {
  if (typeof errors !== 'object' || errors === null) return [];
  if ('message' in errors && typeof errors.message === 'string') return [{ field: path, says: errors.message }];
  return Object.entries(errors).flatMap(([key, inner]) => (key === 'ref' || key === 'types' ? [] : troublesOf(inner, path ? `${path}.${key}` : key)));
}
