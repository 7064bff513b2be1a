import type { Microphone } from './voice'

/** The phone's microphone. Works in flight mode; the first time the browser asks the person. */
export const browserMicrophone: Microphone = {
  record: async () => (await import('./voice-recorder')).recordVoice(),
}
