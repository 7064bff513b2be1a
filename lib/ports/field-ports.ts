import type { Camera } from './camera'
import { browserMicrophone } from './microphone'
import { browserPosition, type Position } from './position'
import { browserSyncPorts, type SyncPorts } from './sync-ports'
import type { Microphone } from './voice'

/** Everything of the outside that the field app touches. */
export type FieldPorts = SyncPorts & {
  position: Position
  camera: Camera
  microphone: Microphone
}

/** The browser's own. */
export const browserPorts: FieldPorts = {
  ...browserSyncPorts,
  position: browserPosition,
  // Fetched from what the phone holds when the first photo is taken.
  camera: { ready: async (file) => (await import('./camera')).browserCamera.ready(file) },
  microphone: browserMicrophone,
}
