import type { UnsentActs } from '@/components/store/use-unsent'
import type { Instant } from '@/lib/model/time'

export type NamedFile = { name: string; file: Blob }

/** All unsent work as named files, mostly one: more when the photos do not fit in one. */
export async function makeFiles(
  unsent: Pick<UnsentActs, 'exportFiles'>,
  now: Instant,
): Promise<NamedFile[]> {
  const files = await unsent.exportFiles()
  const stem = `farbench-unsent-${now.slice(0, 16).replace(/[:T]/g, '-')}`
  return files.map((file, index) => ({
    file,
    name: files.length === 1 ? `${stem}.json` : `${stem}-${index + 1}.json`,
  }))
}

/**
 * Hands one file to the browser. Whether it kept it, it does not say: nothing may be deleted on the strength of
 * this alone. One file for each press, as many browsers take no second one.
 */
export function handToBrowser({ file, name }: NamedFile): void {
  const url = URL.createObjectURL(file)
  const link = document.createElement('a')
  link.href = url
  link.download = name
  link.click()
  setTimeout(() => URL.revokeObjectURL(url), 60_000)
}
