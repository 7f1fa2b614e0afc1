import { randomBytes } from 'node:crypto'
import { mkdir, readFile, readdir, rename, writeFile } from 'node:fs/promises'
import { join } from 'node:path'
import { readMessage } from './read-message.mjs'

const NAME = /^\d{13}-[0-9a-f]{8}\.eml$/

/**
 * Letters as files in a folder, named by the time of their arrival.
 * @param {string} folder
 */
export function openMailFolder(folder) {
  return {
    /**
     * Keeps a letter; when this resolves it is on the disk, whole.
     * @param {Uint8Array} source
     * @param {number} receivedMs
     */
    async keep(source, receivedMs) {
      await mkdir(folder, { recursive: true })
      const name = `${receivedMs}-${randomBytes(4).toString('hex')}.eml`
      await writeFile(join(folder, `${name}.part`), source)
      await rename(join(folder, `${name}.part`), join(folder, name))
      return name
    },
    /** All letters, newest first. */
    async list() {
      await mkdir(folder, { recursive: true })
      const names = (await readdir(folder)).filter(name => NAME.test(name)).sort().reverse()
      return await Promise.all(names.map(async name => ({
        name,
        receivedMs: Number(name.slice(0, 13)),
        message: readMessage(await readFile(join(folder, name))),
      })))
    },
    /**
     * @param {string} name
     * @returns {Promise<Buffer | null>} null where there is no such letter
     */
    async source(name) {
      if (!NAME.test(name)) return null
      try {
        return await readFile(join(folder, name))
      }
      catch (error) {
        if (error instanceof Error && 'code' in error && error.code === 'ENOENT') return null
        throw error
      }
    },
  }
}

/** @typedef {ReturnType<typeof openMailFolder>} MailFolder */
