import type { ServerResponse } from 'node:http'
import type { Outlet } from './hub'

/** The end of a stream that writes to an answer of this server. */
export function outletOf(res: ServerResponse): Outlet {
  return { write: text => res.write(text), waiting: () => res.writableLength, end: () => res.end(), drop: () => res.destroy() }
}
