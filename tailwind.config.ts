import type { Config } from 'tailwindcss';

/** Names of the look; their values for day and night stand in app/globals.css. */
const COLOURS = ['sheet', 'lit', 'desk', 'well', 'ink', 'ink2', 'ink3', 'on', 'rule', 'rule2', 'madder', 'ochre', 'green', 'mercury', 'range', 'glass', 'foam'] as const;

export default {
  content: ['./app/**/*.{ts,tsx}', './components/**/*.{ts,tsx}'],
  theme: {
    colors: {
      transparent: 'transparent',
      current: 'currentColor',
      ...Object.fromEntries(COLOURS.map((name) => [name, `var(--${name})`])),
    },
    fontFamily: { mono: 'var(--mono)', serif: 'var(--serif)' },
    borderRadius: { none: '0', DEFAULT: '2px' },
    // 720 and 1100 px; in em, so that large text gets the layout that has room for it.
    screens: { strip: '45em', wide: '68.75em' },
    // No shadows, no gradients, no rounded boxes: what the theme does not name cannot be used.
    boxShadow: {},
  },
} satisfies Config;
