import { mkdirSync, writeFileSync } from 'node:fs'
import { dirname, join } from 'node:path'
import { fileURLToPath } from 'node:url'
import { chromium } from '@playwright/test'

/**
 * Draws the app's icon (bolt head with its paint stripe between two jaws, on the layout-blue plate) and
 * writes it as SVG, as PNG in the sizes of the manifest, and as favicon. Run by hand after a change;
 * the files are kept in the repository.
 */
const root = join(dirname(fileURLToPath(import.meta.url)), '..')
const icons = join(root, 'public', 'icons')

/** The drawing in 100 x 100 around the middle; `scale` leaves room for a mask. */
function drawing({ ground, line, paint, paintInk, seat }, scale) {
  return `<rect width="100" height="100" fill="${ground}"/>
<g transform="translate(50 50) scale(${scale}) translate(-50 -50)" fill="none" stroke="${line}" stroke-width="5.5">
<path d="M16 14H8V86H16M84 14H92V86H84"/>
<circle cx="50" cy="50" r="31"/>
<path d="M50 27 69.9 38.5V61.5L50 73 30.1 61.5V38.5Z" fill="${seat}"/>
<path d="M44 8H56V92H44Z" fill="${paint}" stroke="${paintInk}" stroke-width="3.4"/>
<path d="M44 19.5H56M44 80.5H56" stroke="${paintInk}" stroke-width="3.4"/>
</g>`
}

const COLOURS = {
  ground: '#0e3a66',
  line: '#ffffff',
  paint: '#ffc61a',
  paintInk: '#0c1412',
  seat: '#0e3a66',
}
const MONO = {
  ground: 'none',
  line: '#ffffff',
  paint: '#ffffff',
  paintInk: '#ffffff',
  seat: 'none',
}
const svg = (inside) =>
  `<svg xmlns="http://www.w3.org/2000/svg" viewBox="0 0 100 100">${inside}</svg>\n`

const WANTED = [
  { name: 'any-192.png', size: 192, inside: drawing(COLOURS, 0.92) },
  { name: 'any-512.png', size: 512, inside: drawing(COLOURS, 0.92) },
  { name: 'maskable-512.png', size: 512, inside: drawing(COLOURS, 0.68) },
  { name: 'monochrome-512.png', size: 512, inside: drawing(MONO, 0.86) },
  { name: 'apple-180.png', size: 180, inside: drawing(COLOURS, 0.84) },
]

mkdirSync(icons, { recursive: true })
writeFileSync(join(icons, 'icon.svg'), svg(drawing(COLOURS, 0.92)))

const browser = await chromium.launch({
  executablePath: process.env.CHROMIUM_PATH ?? '/usr/bin/chromium',
  args: ['--no-sandbox', '--disable-gpu'],
})
const page = await browser.newPage()

async function png(inside, size) {
  await page.setViewportSize({ width: size, height: size })
  await page.setContent(
    `<style>body{margin:0}svg{display:block;width:${size}px;height:${size}px}</style>${svg(inside)}`,
  )
  return page.screenshot({ omitBackground: true })
}

for (const { name, size, inside } of WANTED) {
  writeFileSync(join(icons, name), await png(inside, size))
}
writeFileSync(join(root, 'public', 'favicon.ico'), ico(await png(drawing(COLOURS, 1), 32), 32))
await browser.close()

/** One PNG in an ICO container (its header is 6 bytes, one directory entry 16). */
function ico(image, size) {
  const head = Buffer.alloc(22)
  head.writeUInt16LE(1, 2)
  head.writeUInt16LE(1, 4)
  head.writeUInt8(size, 6)
  head.writeUInt8(size, 7)
  head.writeUInt16LE(1, 10)
  head.writeUInt16LE(32, 12)
  head.writeUInt32LE(image.length, 14)
  head.writeUInt32LE(22, 18)
  return Buffer.concat([head, image])
}
