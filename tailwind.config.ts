import type { Config } from 'tailwindcss'

/** Colours are named by their role (look.md's tokens); the values are CSS variables so that the theme can change them. */
const role = (name: string) => `rgb(var(--${name}) / <alpha-value>)`

export default {
  content: ['./app.vue', './error.vue', './pages/**/*.vue', './layouts/**/*.vue', './components/**/*.vue'],
  darkMode: 'media',
  theme: {
    colors: {
      transparent: 'transparent',
      current: 'currentColor',
      paper: role('paper'),
      card: role('card'),
      ink: role('ink'),
      muted: role('muted'),
      rule: role('rule'),
      accent: role('accent'),
      accept: role('accept'),
      return: role('return'),
      decline: role('decline'),
      wait: role('wait'),
    },
    borderRadius: { none: '0', sm: '2px', DEFAULT: '2px', full: '9999px' },
    boxShadow: { none: 'none' },
    fontFamily: {
      sans: ['Lato', 'system-ui', 'sans-serif'],
      serif: ['Merriweather', 'Georgia', 'serif'],
      mono: ['ui-monospace', 'monospace'],
    },
    extend: {
      fontSize: { desk: ['14px', { lineHeight: '1.4' }], body: ['16px', { lineHeight: '1.55' }] },
      maxWidth: { prose: '66ch', page: '76rem' },
      transitionDuration: { DEFAULT: '120ms' },
      screens: { xs: '360px' },
    },
  },
} satisfies Config
