import type { Config } from 'tailwindcss'

/** A token of `assets/css/main.css`, light and dark in one name. */
const token = (name: string) => `rgb(var(--${name}) / <alpha-value>)`

export default {
  content: [],
  theme: {
    colors: {
      'transparent': 'transparent',
      'current': 'currentColor',
      'paper': token('paper'),
      'card': token('card'),
      'ink': token('ink'),
      'ink-soft': token('ink-soft'),
      'line': token('line'),
      'line-strong': token('line-strong'),
      'enamel': token('enamel'),
      'enamel-deep': token('enamel-deep'),
      'enamel-tint': token('enamel-tint'),
      'on-enamel': token('on-enamel'),
      'amber': token('amber'),
      'amber-tint': token('amber-tint'),
      'fault': token('fault'),
      'fault-tint': token('fault-tint'),
      'on-fault': token('on-fault'),
      'brass': token('brass'),
      'brass-ink': token('brass-ink'),
    },
    fontFamily: {
      sans: ['"Work Sans"', '"Knurl Symbols"', 'system-ui', 'sans-serif'],
    },
    extend: {
      minHeight: { touch: '44px' },
      minWidth: { touch: '44px' },
      maxWidth: { page: '1440px', prose: '68ch', form: '640px' },
      letterSpacing: { plate: '0.12em' },
      borderRadius: { DEFAULT: '4px', plate: '8px' },
    },
  },
} satisfies Config
