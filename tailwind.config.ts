import type { Config } from 'tailwindcss'

const token = (name: string) => `rgb(var(--${name}) / <alpha-value>)`

// Names of the colour tokens; their day and night values stand in app/globals.css.
export default {
  darkMode: 'class',
  content: ['./app/**/*.{ts,tsx}', './components/**/*.{ts,tsx}'],
  theme: {
    colors: {
      transparent: 'transparent',
      current: 'currentColor',
      paper: token('paper'),
      field: token('field'),
      ink: token('ink'),
      line: token('line'),
      muted: token('muted'),
      band: token('band'),
      dawn: token('dawn'),
      calm: token('calm'),
      wait: token('wait'),
      stop: token('stop'),
    },
    fontFamily: {
      sans: ["'Atkinson Hyperlegible Next Variable'", "'Daybreath Symbols'", 'system-ui', 'sans-serif'],
      mono: ["'Atkinson Hyperlegible Mono Variable'", "'Daybreath Symbols'", 'ui-monospace', 'monospace'],
    },
    extend: {
      screens: { phone: '480px', tablet: '768px', desk: '1100px' },
      spacing: { target: '44px' },
      maxWidth: { page: '1440px', reading: '68ch' },
      borderRadius: { control: '8px' },
    },
  },
} satisfies Config
