import type { Config } from 'tailwindcss';

/**
 * Every colour of the program. The values live in `app/globals.css` as custom properties, once for the
 * paper theme and once for dusk; nothing outside these names may carry a colour.
 */
const config: Config = {
  content: ['./app/**/*.{ts,tsx}', './components/**/*.{ts,tsx}'],
  darkMode: ['selector', '[data-theme="dusk"]'],
  theme: {
    colors: {
      transparent: 'transparent',
      current: 'currentColor',
      paper: { DEFAULT: 'var(--paper)', raised: 'var(--paper-raised)', sunk: 'var(--paper-sunk)', line: 'var(--paper-line)' },
      ink: { DEFAULT: 'var(--ink)', soft: 'var(--ink-soft)', faint: 'var(--ink-faint)' },
      bronze: { DEFAULT: 'var(--bronze)', strong: 'var(--bronze-strong)', wash: 'var(--bronze-wash)', on: 'var(--bronze-on)' },
      doubt: { DEFAULT: 'var(--doubt)', wash: 'var(--doubt-wash)', on: 'var(--doubt-on)' },
      fine: { DEFAULT: 'var(--fine)', wash: 'var(--fine-wash)' },
      halt: { DEFAULT: 'var(--halt)', wash: 'var(--halt-wash)', on: 'var(--halt-on)' },
    },
    fontFamily: {
      text: ['var(--font-text)', 'system-ui', 'sans-serif'],
      digits: ['var(--font-digits)', 'ui-monospace', 'monospace'],
    },
    extend: {
      minHeight: { target: '56px', glove: '76px' },
      minWidth: { target: '56px', glove: '76px' },
      spacing: { target: '56px', glove: '76px' },
    },
  },
  plugins: [],
};

export default config;
