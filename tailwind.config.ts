import type { Config } from 'tailwindcss';

// Colours, sizes and radii are closed sets: a class outside them makes no style, so a screen cannot leave the look unnoticed.
const config: Config = {
  content: ['./app/**/*.{ts,tsx}', './components/**/*.{ts,tsx}'],
  theme: {
    colors: {
      transparent: 'transparent',
      current: 'currentColor',
      ground: 'var(--ground)',
      bench: 'var(--bench)',
      raised: 'var(--raised)',
      selected: 'var(--selected)',
      rule: 'var(--rule)',
      'rule-strong': 'var(--rule-strong)',
      edge: 'var(--edge)',
      ink: 'var(--ink)',
      'ink-2': 'var(--ink-2)',
      'ink-3': 'var(--ink-3)',
      brass: 'var(--brass)',
      'on-brass': 'var(--on-brass)',
      verdigris: 'var(--verdigris)',
      pewter: 'var(--pewter)',
      wrong: 'var(--wrong)',
      veil: 'var(--veil)',
    },
    fontFamily: {
      sans: 'var(--font-sans)',
      mono: 'var(--font-mono)',
    },
    fontSize: {
      12: ['0.75rem', '1rem'],
      13: ['0.8125rem', '1.25rem'],
      14: ['0.875rem', '1.25rem'],
      16: ['1rem', '1.5rem'],
      22: ['1.375rem', '1.75rem'],
      32: ['2rem', '2.5rem'],
    },
    borderRadius: { none: '0', DEFAULT: '4px', full: '9999px' },
  },
};

export default config;
