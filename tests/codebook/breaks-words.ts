import type { Break } from './broken-book'

/** Books broken in their words: steps too hard, rows copied, first looks that are none, complaints that open wrongly. */
export const WORD_BREAKS: Break[] = [
  [
    'CB19 steps that read like a contract',
    'readingLevel',
    /plugRead/,
    (b) => {
      b.item('check', 'plugRead').steps = [
        {
          text: 'Subsequently ascertain electrode discolouration characteristics utilising appropriate illumination.',
          caution: null,
        },
      ]
    },
  ],
  [
    'CB19 one step that never ends',
    'readingLevel',
    /plugRead/,
    (b) => {
      b.item('check', 'plugRead').steps.push({
        text: `Look at it ${'and then look at it '.repeat(6)}again.`,
        caution: null,
      })
    },
  ],
  [
    'CB20 one row copied into every table',
    'sameRows',
    /tables/,
    (b) => {
      for (const item of b.items)
        if (item.kind === 'check' && item.outcomes.length === 3)
          for (const fault of Object.keys(item.table)) item.table[fault] = [10, 10, 80]
    },
  ],
  [
    'CB23 a question with one answer',
    'asked',
    /startsThenDies/,
    (b) => {
      const { conditions } = b.item('symptom', 'startsThenDies')
      conditions.push({ id: 'alone', name: 'Alone', answers: 'Alone?', tells: null })
    },
  ],
  [
    'CB23 a question that one fault answers twice over',
    'asked',
    /startsThenDies/,
    (b) => {
      for (const { answers, tells } of b.item('symptom', 'startsThenDies').conditions)
        if (answers === 'How often?' && tells !== null) tells.of100.fuelStale = 60
    },
  ],
  [
    'CB24 a repair that does better without its part',
    'order',
    /groundPoor/,
    (b) => {
      const { repair } = b.item('fault', 'groundPoor')
      if (repair !== null) repair.withoutPartOf100 = repair.successOf100 + 1
    },
  ],
  [
    'CB24 a repair without a part that does without one',
    'order',
    /groundPoor/,
    (b) => {
      const { repair } = b.item('fault', 'groundPoor')
      if (repair !== null) repair.part = null
    },
  ],
  [
    'CB21 a first look that turns the engine',
    'firstLook',
    /startsThenDies/,
    (b) => {
      b.item('symptom', 'startsThenDies').firstLook = ['batteryCranking']
    },
  ],
  [
    'CB21 a complaint that opens the way out, with suspects',
    'orphan',
    /startsThenDies/,
    (b) => {
      b.item('symptom', 'startsThenDies').opens = 'wayOut'
    },
  ],
  [
    'CB3 a first look that is not there',
    'unresolved',
    /startsThenDies/,
    (b) => {
      b.item('symptom', 'startsThenDies').firstLook = ['lookHard']
    },
  ],
]
