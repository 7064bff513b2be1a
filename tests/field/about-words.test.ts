import { expect, it } from 'vitest'
import { unsentWords } from '@/components/field/phone/about-screen'

it('[P23] says nothing of what is sent before it is counted', () => {
  expect(unsentWords({ counted: false, count: 0 })).toBe('Counting')
  expect(unsentWords({ counted: true, count: 0 })).toBe('Nothing')
  expect(unsentWords({ counted: true, count: 3 })).toBe('3 things')
})
