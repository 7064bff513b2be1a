import { afterEach, expect, test, vi } from 'vitest'
import { listenToBrowser } from '@/lib/sync/client/browser-events'

afterEach(() => {
  vi.unstubAllGlobals()
})

/** A page with a window and a document that tests speak for. */
function pageOf() {
  const window = new EventTarget()
  const document = Object.assign(new EventTarget(), { visibilityState: 'visible' })
  vi.stubGlobal('addEventListener', window.addEventListener.bind(window))
  vi.stubGlobal('removeEventListener', window.removeEventListener.bind(window))
  vi.stubGlobal('document', document)
  const heard: string[] = []
  const leave = listenToBrowser({
    online: () => heard.push('online'),
    visible: () => heard.push('visible'),
    asleep: () => heard.push('asleep'),
  })
  const say = (name: string) => {
    const of = ['online', 'pageshow', 'pagehide'].includes(name) ? window : document
    of.dispatchEvent(new Event(name))
    return heard.splice(0)
  }
  return { document, say, leave }
}

test('[fault 23] [P19] a page put to sleep hands its turn on, and asks for it when it is back', () => {
  const { document, say, leave } = pageOf()
  // Into the browser's back and forward cache and out of it again.
  expect(say('pagehide')).toEqual(['asleep'])
  expect(say('pageshow')).toEqual(['visible'])
  expect(say('freeze')).toEqual(['asleep'])
  expect(say('resume')).toEqual(['visible'])
  document.visibilityState = 'hidden'
  expect([say('visibilitychange'), say('pageshow'), say('resume')]).toEqual([[], [], []])
  document.visibilityState = 'visible'
  expect(say('visibilitychange')).toEqual(['visible'])
  expect(say('online')).toEqual(['online'])
  leave()
  expect([say('pagehide'), say('pageshow'), say('online')]).toEqual([[], [], []])
})
