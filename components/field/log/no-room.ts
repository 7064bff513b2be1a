import { AppError } from '@/lib/model/result'

/** True when the phone has no room for a photo or a voice note (P21). */
export const isNoRoom = (cause: unknown): boolean =>
  cause instanceof AppError && (cause.kind === 'noRoomForPhoto' || cause.kind === 'storeFull')

export const NO_ROOM =
  'This phone has no room for it. Send what waits, or delete something else on the phone. Nothing unsent was deleted.'
