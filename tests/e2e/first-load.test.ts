import { readFileSync } from 'node:fs'
import { gzipSync } from 'node:zlib'
import { expect, test } from '@playwright/test'

/** What the field may weigh at its first load: scripts of the document, gzip -9; the budget of the stack's notes. */
const MOST_BYTES = 240_000

/** Addresses of the scripts that a browser of today fetches for a prerendered page. */
function scriptsOf(page: string): string[] {
  const html = readFileSync(`.next/server/app/${page}.html`, 'utf8')
  const tags = [...html.matchAll(/<script[^>]+src="([^"]+)"[^>]*>/g)]
  const today = tags.filter(([tag]) => !/nomodule/i.test(tag))
  return [...new Set(today.map(([, src]) => (src ?? '').split('?')[0] ?? ''))]
}

const fileOf = (src: string) =>
  src.startsWith('/_next/') ? `.next/${src.slice('/_next/'.length)}` : `public${src}`

test('the scripts of the field weigh no more than their budget', () => {
  const scripts = scriptsOf('field')
  expect(scripts.length).toBeGreaterThan(5)
  const bytes = scripts.map((src) => gzipSync(readFileSync(fileOf(src)), { level: 9 }).length)
  const total = bytes.reduce((sum, one) => sum + one, 0)
  console.log(`/field: ${total} bytes of scripts in ${scripts.length} files`)
  expect(total).toBeLessThanOrEqual(MOST_BYTES)
})
