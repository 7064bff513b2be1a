'use client'
import type { PhotoView } from '@/lib/sync/client/views'
import { usePhone } from './store-provider'
import { still, useWatch } from './use-watch'

const NONE: PhotoView = { url: null, thumb: null, onPhone: false }
const OPENING = still(NONE)

/** Where to show a photo or play a voice note from: the bytes held here, else the shop's copy once it has one. */
export function usePhoto(hash: string): PhotoView {
  const phone = usePhone()
  return useWatch(phone === null ? OPENING : phone.photo(hash))
}
