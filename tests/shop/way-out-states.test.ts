import { describe, expect, it } from 'vitest'
import { WAYS_OUT } from '@/lib/model/job'
import { jobStateAfter, leftBehindLacks, statesAfter } from '@/lib/shop/way-out-states'

describe('states after a way out', () => {
  it.each([
    ['repairHere', 'runs'],
    ['limpOut', 'limping'],
    ['tow', 'onTow'],
    ['returnLater', 'leftBehind'],
  ] as const)(
    '[R2] %s leaves a stranded machine %s and the people on their way',
    (way, machine) => {
      const now = { machineState: 'stranded', peopleState: 'withMachine' } as const
      expect(statesAfter(way, now)).toEqual({ machine, people: 'onTheWay' })
    },
  )

  it('[R2] a state that may not be reached stays: at the shop nothing is left behind, who is fetched may walk', () => {
    const now = { machineState: 'atShop', peopleState: 'beingFetched' } as const
    expect(statesAfter('returnLater', now)).toEqual({ machine: 'atShop', people: 'onTheWay' })
    for (const way of WAYS_OUT)
      expect(statesAfter(way, { ...now, peopleState: 'onTheWay' }).people).toBe('onTheWay')
  })

  it.each(WAYS_OUT)('[R2] safe people stay safe with %s', (way) => {
    const now = { machineState: 'stranded', peopleState: 'safe' } as const
    expect(statesAfter(way, now).people).toBe('safe')
  })

  it('[R2] a job no longer waits to be fetched once its machine is not left behind any more', () => {
    for (const machine of ['stranded', 'runs', 'limping', 'onTow', 'atShop'] as const)
      expect(jobStateAfter('waitingRetrieval', machine)).toBe('underWay')
    expect(jobStateAfter('waitingRetrieval', 'leftBehind')).toBe('waitingRetrieval')
  })

  it('[R13] a job waits for a machine left behind, is under way when begun by it, and stays closed', () => {
    expect(jobStateAfter('waitingParts', 'leftBehind')).toBe('waitingRetrieval')
    expect(['called', 'open', 'assigned'].map((s) => jobStateAfter(s as 'open', 'runs'))).toEqual([
      'underWay',
      'underWay',
      'underWay',
    ])
    expect(jobStateAfter('waitingParts', 'onTow')).toBe('waitingParts')
    expect(jobStateAfter('closed', 'leftBehind')).toBe('closed')
  })

  it('[R2] a machine is left behind only with position, photo and every line', () => {
    const lines = { key: 'Box', tap: 'Shut', secured: 'Tree', land: 'Ours', fetch: 'Friday' }
    const told = { hasPlace: true, hasPhoto: true, lines }
    expect(leftBehindLacks(told)).toBeNull()
    expect(leftBehindLacks({ ...told, hasPlace: false, hasPhoto: false })).toBe('place')
    expect(leftBehindLacks({ ...told, hasPhoto: false })).toBe('photo')
    for (const line of ['key', 'tap', 'secured', 'land', 'fetch'])
      expect(leftBehindLacks({ ...told, lines: { ...lines, [line]: ' ' } })).toBe('lines')
  })
})
