import type { Config } from 'tailwindcss';

/** Every colour is a token of components/ui/css/tokens.css: a utility names the token, never a palette. */
const tokens = [
  'paper', 'sheet', 'well', 'rule', 'rule-strong', 'ink', 'ink-soft',
  'enamel', 'enamel-wash', 'enamel-press', 'on-enamel', 'copper', 'glyptal', 'glyptal-wash', 'on-glyptal',
  'brass', 'brass-wash', 'slate', 'slate-wash',
];

const config: Config = {
  content: ['./app/**/*.tsx', './components/**/*.tsx'],
  theme: {
    colors: {
      ...Object.fromEntries(tokens.map((name) => [name, `var(--${name})`])),
      transparent: 'transparent',
      current: 'currentColor',
    },
    fontFamily: { sans: 'var(--sans)', cond: 'var(--cond)', mono: 'var(--mono)' },
    fontSize: {
      13: ['var(--t13)', '1.25rem'],
      15: ['var(--t15)', '1.5rem'],
      16: ['var(--t16)', '1.5rem'],
      18: ['var(--t18)', '1.75rem'],
      22: ['var(--t22)', '1.75rem'],
      28: ['var(--t28)', '2.25rem'],
      36: ['var(--t36)', '2.75rem'],
    },
    borderRadius: { none: '0', mark: 'var(--r-mark)', control: 'var(--r-control)', plate: 'var(--r-plate)' },
    boxShadow: {},
    extend: { maxWidth: { measure: '68ch', sheet: 'var(--exam-column)' } },
  },
};
export default config;
