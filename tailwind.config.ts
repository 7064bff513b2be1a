import type { Config } from 'tailwindcss'

/** The design's tokens by name. Values live as CSS variables in components/ui/styles/tokens.css, one set per theme. */
const token = (name: string) => `var(--${name})`

export default {
  content: ['./app/**/*.{ts,tsx}', './components/**/*.{ts,tsx}'],
  theme: {
    colors: {
      transparent: 'transparent',
      current: 'currentColor',
      ground: token('ground'),
      well: token('well'),
      ink: token('ink'),
      ink2: token('ink2'),
      rule: token('rule'),
      plateEdge: token('plate-edge'),
      scribe: token('scribe'),
      scribe2: token('scribe2'),
      go: token('go'),
      nogo: token('nogo'),
      close: token('close'),
      paint: token('paint'),
      paintInk: token('paint-ink'),
      bar: token('bar'),
      dark: token('dark'),
      darkInk: token('dark-ink'),
    },
    fontFamily: {
      display: token('font-display'),
      text: token('font-text'),
      figure: token('font-figure'),
    },
    fontSize: {
      hero: ['3.375rem', '1'],
      figure: ['2.75rem', '1'],
      plate: ['2.25rem', '1'],
      screen: ['1.875rem', '1'],
      key: ['1.625rem', '1'],
      section: ['1.375rem', '1'],
      row: ['1.1875rem', '1.2'],
      body: ['1.125rem', '1.35'],
      second: ['1rem', '1.3'],
    },
    fontWeight: { normal: '500', bold: '650', heavy: '800' },
    borderRadius: { none: '0', plate: '2px', key: '4px' },
    extend: {
      // In rem, so that they follow the person's own text size: 320 and 360 px at 16 px text.
      screens: { slim: '20rem', roomy: '22.5rem' },
      // Not under `colors`: `text-plate` is a size. The plate is a ground and a line, never text.
      backgroundColor: { plate: token('plate') },
      borderColor: { plate: token('plate') },
      fill: { plate: token('plate') },
      stroke: { plate: token('plate') },
      minWidth: { target: '3.5rem' },
      minHeight: { target: '3.5rem', key: '4rem', main: '4.5rem', row: '4.25rem' },
      maxWidth: { column: '42.5rem' },
      transitionDuration: { press: '90ms', slide: '160ms', home: '240ms' },
      transitionTimingFunction: { firm: 'cubic-bezier(.2,0,0,1)' },
    },
  },
} satisfies Config
