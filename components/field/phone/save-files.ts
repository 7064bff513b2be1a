import type { UnsentActs } from '@/components/store/use-unsent'
import type { Instant } from '@/lib/model/time'

/**
 * Hands all unsent work to the browser as files, one after the other; answers their names. Whether the
 * browser kept them it does not say: nothing may be deleted on the strength of this alone.
 */
export async function handFilesOver(
  unsent: Pick<UnsentActs, 'exportFiles'>,
  now: Instant,
): Promise<string[]> {
  const files = await unsent.exportFiles()
  const stem = `farbench-unsent-${now.slice(0, 16).replace(/[:T]/g, '-')}`
  return files.map((file, index) => {
    const name = files.length === 1 ? `${stem}.json` : `${stem}-${index + 1}.json`
    download(file, name)
    return name
  })
}

function download(file: Blob, name: string): void {
  const url = URL.createObjectURL(file)
  const link = document.createElement('a')
  link.href = url
  link.download = name
  link.click()
  setTimeout(() => URL.revokeObjectURL(url), 60_000)
}
