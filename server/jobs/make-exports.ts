import { CONTENTS } from '../utils/exports/contents'
import { expireExports, workExports } from '../utils/exports/work'
import { fileStorage } from '../utils/files/storage'
import type { Job } from './job'
import { MAKE_EXPORTS } from './names'

/** Makes the exports that people asked for, and goes on with those whose process was ended. */
export const makeExportsJob: Job = {
  name: MAKE_EXPORTS,
  every: 30,
  takes: 4 * 3600,
  // Each export is claimed by its row.
  together: true,
  run: db => workExports({ db, storage: fileStorage(), clock: Date.now, contents: CONTENTS }),
}

/** Takes away the files of exports that are past their time. */
export const expireExportsJob: Job = {
  name: 'expire-exports',
  every: 600,
  run: db => expireExports({ db, storage: fileStorage(), clock: Date.now }),
}
