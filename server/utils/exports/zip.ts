/** A ZIP whose files are made one after another, each when the one before it has been read. */
import { Readable } from 'node:stream'
import { ZipFile } from 'yazl'

/** A file to come: its name, its date, and what makes its bytes. */
export interface ComingFile { name: string, at: Date, make: () => Promise<Uint8Array> }

/** The bytes of the ZIP as they come to be; what a file throws ends them. @param files names must differ */
export async function* zipOf(files: readonly ComingFile[]): AsyncGenerator<Uint8Array> {
  const zip = new ZipFile()
  const output = zip.outputStream as Readable
  zip.on('error', (error: Error) => output.destroy(error))
  for (const { name, at, make } of files) {
    // PDF is compressed already: the quickest level, since files of unknown length must not be merely stored.
    zip.addReadStreamLazy(name, { mtime: at, mode: 0o100644, compressionLevel: 1 }, (give) => {
      make().then(bytes => give(null, Readable.from([Buffer.from(bytes)])), (error: unknown) => give(error, Readable.from([])))
    })
  }
  zip.end()
  for await (const chunk of output) yield chunk as Uint8Array
}
