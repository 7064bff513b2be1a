/** What a container says of its sound: how long it is, and whether it says where it was made. */
export type Heard = { seconds: number; hasPosition: boolean }
