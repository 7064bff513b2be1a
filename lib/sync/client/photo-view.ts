import type { Core } from './core'
import { liveCell } from './live'
import { sealedPhoto } from './phone-db'
import { photoPlace, thumbPlace } from './record'
import { openBytes, type Sealed } from './seal'
import type { PhotoView } from './views'
import type { Watch } from './watch'

type Found = { whole: Sealed | null; thumb: Sealed | null; mime: string; atShop: boolean }

/** A photo or a voice note as it can be shown now; addresses made here live as long as somebody looks. */
export function livePhoto(
  core: Core,
  hash: string,
  failed: (cause: unknown) => void,
): Watch<PhotoView> {
  const { db, keys } = core
  const made = new Map<string, string>()
  const address = async (place: string, sealed: Sealed, mime: string): Promise<string> => {
    const bytes = await openBytes(keys.store, place, sealed)
    const url = made.get(place) ?? URL.createObjectURL(new Blob([bytes], { type: mime }))
    made.set(place, url)
    return url
  }
  const shown = (place: string, sealed: Sealed | null, mime: string) =>
    sealed === null ? null : (made.get(place) ?? address(place, sealed, mime))
  return liveCell<Found, PhotoView>({
    initial: { url: null, thumb: null, onPhone: false },
    read: async () => {
      const photo = await db.photo.get(hash)
      const whole = photo === undefined ? null : await sealedPhoto(db, photo)
      const atShop = (await db.row.where('key').equals(`photo/${hash}`).count()) > 0
      const isSent = photo?.state === 'sent'
      return {
        whole,
        thumb: photo?.thumb ?? null,
        mime: photo?.mime ?? '',
        atShop: atShop || isSent,
      }
    },
    open: async ({ whole, thumb, mime, atShop }) => {
      const here = await shown(photoPlace(hash), whole, mime)
      const small = await shown(thumbPlace(hash), thumb, 'image/jpeg')
      const shop = (size: string) => (atShop ? `/api/photos/${hash}?size=${size}` : null)
      return {
        url: here ?? shop('show'),
        thumb: small ?? here ?? shop('thumb'),
        onPhone: here !== null,
      }
    },
    failed,
    life: db.life,
    ended: () => {
      for (const url of made.values()) URL.revokeObjectURL(url)
      made.clear()
    },
  })
}
