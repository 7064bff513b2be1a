import MiniSearch from 'minisearch'
import { letsThrough } from '@/lib/diag/gate'
import type { SymptomItem } from '@/lib/model/code-book'
import type { Features } from '@/lib/model/features'

/** Words of every complaint, which find nothing. */
const EMPTY = new Set(
  'a an and at away be but did do does for get gets got has have i in is it its just my no not now of off on out s so t that the then this to up was when with'.split(
    ' ',
  ),
)

const plain = (text: string): string => text.toLowerCase().replaceAll(/['’]/g, '')

/** Symptoms that fit a machine, to be looked for as riders say it: parts of words and slips of the thumb count. */
export class SymptomSearch {
  readonly #fit: readonly SymptomItem[]
  readonly #found: MiniSearch<{ id: string; name: string; words: string }>

  constructor(symptoms: readonly SymptomItem[], features: Features) {
    this.#fit = symptoms.filter((symptom) => letsThrough(symptom.gate, features))
    this.#found = new MiniSearch({
      fields: ['name', 'words'],
      processTerm: (term) => (EMPTY.has(plain(term)) ? null : plain(term)),
      searchOptions: {
        boost: { name: 2 },
        prefix: (term) => term.length > 2,
        fuzzy: (term) => (term.length > 4 ? 0.2 : false),
      },
    })
    this.#found.addAll(
      this.#fit.map(({ id, name, riderWords }) => ({ id, name, words: riderWords.join(' ') })),
    )
  }

  /** All that fit, in the order of the book. */
  get all(): readonly SymptomItem[] {
    return this.#fit
  }

  /** Those that the words speak of, the likeliest first; what a rider's saying fits whole comes before all else. */
  find(wanted: string): readonly SymptomItem[] {
    const said = plain(wanted)
    const found = new Map(this.#found.search(wanted).map(({ id }, place) => [String(id), place]))
    const place = ({ id, riderWords }: SymptomItem): number | undefined =>
      riderWords.some((words) => said.includes(plain(words))) ? -1 : found.get(id)
    return this.#fit
      .map((symptom) => ({ symptom, at: place(symptom) }))
      .filter((one): one is { symptom: SymptomItem; at: number } => one.at !== undefined)
      .sort((a, b) => a.at - b.at)
      .map(({ symptom }) => symptom)
  }
}
