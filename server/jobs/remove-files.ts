import { fileStorage } from '../utils/files/storage'
import { removeFiles } from '../utils/retention/removals'
import type { Job } from './job'

/** Takes files of deleted records out of object storage that could not be taken out at once. */
export const removeFilesJob: Job = {
  name: 'remove-files',
  every: 300,
  async run(db) {
    await removeFiles(db, fileStorage())
  },
}
