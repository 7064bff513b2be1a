import type { Mark } from './outlook-words'

const INK: Record<Mark['shape'], string> = {
  ring: 'stroke-go',
  cross: 'stroke-nogo',
  diamond: 'stroke-close',
  square: 'stroke-close',
}

/** The sign of one outcome, centred on 0,0: ring good, cross bad, diamond and square between. */
export function MarkSign({ shape }: { shape: Mark['shape'] }) {
  return (
    <g className={`${INK[shape]} fill-ground`} strokeWidth="3">
      {shape === 'ring' && <circle r="6.5" />}
      {shape === 'cross' && <path d="M-5.5-5.5 5.5 5.5M5.5-5.5-5.5 5.5" strokeWidth="3.6" />}
      {shape === 'diamond' && <path d="M0-7.5 7.5 0 0 7.5-7.5 0Z" />}
      {shape === 'square' && <rect x="-6" y="-6" width="12" height="12" />}
    </g>
  )
}

/** The same sign as a small picture beside its words. */
export function MarkPicture({ shape }: { shape: Mark['shape'] }) {
  return (
    <svg
      viewBox="-10 -10 20 20"
      className="inline-block size-5 shrink-0 align-[-4px]"
      aria-hidden="true"
    >
      <MarkSign shape={shape} />
    </svg>
  )
}
