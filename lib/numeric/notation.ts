/** How decimals are written. Thousands are set apart by a thin gap in print, whatever the decimal mark. */
export type Notation = { decimal: '.' | ',' };

/** The notation of a locale (BCP 47): `en-CA` has the point, `fr-CA` and `de-DE` the comma. */
export function notationOf(locale: string): Notation {
  const parts = new Intl.NumberFormat(locale).formatToParts(1.5);
  return { decimal: parts.find((part) => part.type === 'decimal')?.value === ',' ? ',' : '.' };
}
