/** Starts the local file store, which speaks S3; port 0 takes any free one. */
export function startFiles(how: {
  port: number
  folder: string
  bucket: string
  key: string
  secret: string
}): Promise<{ port: number; url: string; stop(): Promise<void> }>
