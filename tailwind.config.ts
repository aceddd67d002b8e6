import type { Config } from 'tailwindcss'

const roles = [
  'paper', 'sunk', 'sheet', 'ink', 'ink2', 'ink3', 'rule', 'rule2', 'accent', 'accentDeep', 'onAccent', 'accentTint',
  'ember', 'emberTint', 'onEmber', 'sea', 'land', 'coast', 'band',
]

/** Names only: the colours themselves are CSS variables in src/index.css, one set a theme. */
export default {
  theme: {
    colors: {
      transparent: 'transparent',
      current: 'currentColor',
      ...Object.fromEntries(roles.map((role) => [role, `var(--${role})`])),
    },
    screens: { tab: '45rem', desk: '73rem' },
    fontFamily: {
      words: ['Atkinson Hyperlegible Next Variable', 'system-ui', 'sans-serif'],
      mono: ['Atkinson Hyperlegible Mono Variable', 'ui-monospace', 'monospace'],
    },
    fontSize: {
      fine: ['0.75rem', '1.4'],
      small: ['0.8125rem', '1.4'],
      body: ['0.9375rem', '1.45'],
      lead: ['1.125rem', { lineHeight: '1.35', fontWeight: '700' }],
      title: ['1.5rem', { lineHeight: '1.2', letterSpacing: '-0.015em', fontWeight: '700' }],
      statement: ['2rem', { lineHeight: '1.18', letterSpacing: '-0.02em', fontWeight: '700' }],
      figure: ['2.75rem', { lineHeight: '1.05', letterSpacing: '-0.04em', fontWeight: '650' }],
    },
    fontWeight: { text: '400', label: '500', strong: '650', heading: '700' },
    borderRadius: { none: '0', press: '2px', round: '9999px' },
    boxShadow: {},
  },
} satisfies Config
