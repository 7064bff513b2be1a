import { browserCamera, type Camera } from './camera'
import { browserPosition, type Position } from './position'
import { browserSyncPorts, type SyncPorts } from './sync-ports'

/** Everything of the outside that the field app touches. */
export type FieldPorts = SyncPorts & { position: Position; camera: Camera }

/** The browser's own. */
export const browserPorts: FieldPorts = {
  ...browserSyncPorts,
  position: browserPosition,
  camera: browserCamera,
}
