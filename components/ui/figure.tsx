import { classes } from './class-names'

type Props = {
  /** As shown; a hyphen at the front becomes a minus sign. */
  value: string | number
  unit?: string | null
  /** Plus or minus, as shown. */
  pm?: string | null
  size?: 'hero' | 'figure' | 'screen' | 'row' | 'body'
  className?: string
}

const SIZE = {
  hero: ['text-hero', 'text-key'],
  figure: ['text-figure', 'text-section'],
  screen: ['text-screen', 'text-row'],
  row: ['text-row', 'text-second'],
  body: ['text-body', 'text-second'],
} as const

/** A number in the figure face with its unit in the text face, a thin space between. */
export function Figure({ value, unit, pm, size = 'row', className }: Props) {
  const [number, small] = SIZE[size]
  return (
    <span className={classes('whitespace-nowrap', className)}>
      <span className={classes('figures', number)}>{shownNumber(value)}</span>
      {pm ? <span className={classes('figures ml-2 text-ink2', small)}>±{pm}</span> : null}
      {unit ? (
        <>
          {' '}
          <span className={classes('font-text font-bold', small)}>{unit}</span>
        </>
      ) : null}
    </span>
  )
}

/** The number with U+2212 as its minus sign, as every screen shows it. */
const shownNumber = (value: string | number): string => String(value).replace(/^-/, '−')
