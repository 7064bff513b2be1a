import { classes } from './class-names'

type Props = {
  url: string
  /** What it shows, in words; empty where the words stand beside it. */
  alt: string
  /** Full brightness at night too. */
  bright?: boolean
  className?: string
  /** Called when it cannot be loaded, e.g. without signal. */
  onError?: () => void
}

/** A photo held on the phone or at the shop. At night it is dimmed to 40 %. */
export function Photo({ url, alt, bright = false, className, onError }: Props) {
  return (
    // biome-ignore lint/performance/noImgElement: the bytes come from the phone's own store, there is nothing to optimise
    <img
      src={url}
      alt={alt}
      onError={onError}
      className={classes('border-2 border-ink', !bright && 'photo', className)}
    />
  )
}
