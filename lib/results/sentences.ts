import type { PassRule } from '@/lib/exams/model';

/** What is done to a share before it is compared, as results and reports print it. */
export const roundingSentence: Record<PassRule['rounding'], string> = {
  none: 'Shares are compared as they are, not rounded: 69.99 % is below 70 %. The figures printed are cut off after two decimals.',
  tenth: 'Shares are rounded to one decimal, halves upward, before they are compared: 69.95 % counts as 70.0 %, 69.94 % does not.',
  whole: 'Shares are rounded to whole per cent, halves upward, before they are compared: 69.5 % counts as 70 %, 69.4 % does not.',
};
