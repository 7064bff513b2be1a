import fc from 'fast-check'
import type { BookFile } from '@/db/codebook/file-problem'
import type { CodeBookItem } from '@/lib/model/code-book'
import type { Gate } from '@/lib/model/features'

/** Books of any texts and figures: commas, quotes, line ends, signs of every script. No lone halves of signs: no file can hold those. */
const sentence = fc.string({ unit: 'grapheme', minLength: 3, maxLength: 60 }).filter(isSentence)
const awkward = fc.constantFrom(
  'a,b;c',
  '"quoted"',
  'line\nfeed',
  'line\r\nend',
  'bare\rreturn',
  ' spaces ',
  '=SUM(A1)',
  'null',
  '1.50',
  'true',
  '\ufeffmark',
  "it's — “so”",
)
const words = fc.oneof(sentence, awkward)
const maybe = <T>(one: fc.Arbitrary<T>) => fc.option(one, { nil: null })
const figure = fc.double({ min: -1e6, max: 1e6, noNaN: true })
const slug = fc.stringMatching(/^[a-z][A-Za-z0-9]{0,20}$/)
const gate: fc.Arbitrary<Gate> = fc.constantFrom<Gate>(
  {},
  { kind: ['atv', 'dirtBike'] },
  { battery: ['no'] },
)
const caution = fc.record({
  signal: fc.constantFrom('DANGER' as const, 'NOTICE' as const),
  text: words,
})

function isSentence(text: string): boolean {
  return text.length >= 3 && text.length <= 400
}

const word = fc.record({
  kind: fc.constantFrom('part' as const, 'tool' as const, 'system' as const, 'circuit' as const),
  id: slug,
  name: fc.oneof(words, fc.constant('')),
  source: words,
})
const setup = fc.record({
  kind: fc.constant('setup' as const),
  id: slug,
  name: words,
  minutes: figure,
  requires: fc.array(slug, { maxLength: 3 }),
  closedByTest: fc.boolean(),
  source: words,
})
const swap = fc.record({
  kind: fc.constant('swap' as const),
  id: slug,
  name: words,
  fault: slug,
  part: slug,
  gate,
  minutes: figure,
  setups: fc.array(slug, { maxLength: 2 }),
  guideSafe: fc.boolean(),
  cautions: fc.array(caution, { maxLength: 2 }),
  steps: fc.array(fc.record({ text: words, caution: maybe(caution) }), { maxLength: 3 }),
  table: fc.dictionary(slug, fc.tuple(figure, figure, figure), { maxKeys: 3 }),
  otherwise: fc.tuple(figure, figure, figure),
  basis: fc.constantFrom('physics' as const, 'guess' as const),
  basisWords: words,
  source: words,
})
const fault = fc.record({
  kind: fc.constant('fault' as const),
  id: slug,
  name: fc.constantFrom('Coil, "secondary"', 'Fuse'),
  system: slug,
  gate,
  shares: fc.array(
    fc.record({ symptom: slug, gate, of100: fc.double({ min: 0.001, max: 100, noNaN: true }) }),
    { maxLength: 3 },
  ),
  circuits: fc.array(fc.record({ circuit: slug, role: fc.constant('part' as const) }), {
    maxLength: 2,
  }),
  repair: fc.constant(null),
  onset: maybe(words),
  wayOut: fc.constantFrom('tow' as const, 'limpOut' as const),
  limpRefused: maybe(words),
  provedBy: words,
  source: words,
})

const item: fc.Arbitrary<CodeBookItem> = fc.oneof(word, setup, swap, fault)

export const anyBook: fc.Arbitrary<BookFile> = fc.record({
  items: fc.uniqueArray(item, { maxLength: 12, selector: ({ kind, id }) => `${kind}:${id}` }),
  unseparated: fc.array(fc.record({ faults: fc.tuple(slug, slug), reason: words }), {
    maxLength: 3,
  }),
})
