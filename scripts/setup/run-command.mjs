import { spawn } from 'node:child_process'
import { ROOT } from './paths.mjs'

/**
 * Runs a command in the project's root and waits for it.
 * @param {string} command
 * @param {string[]} args
 * @param {{ env?: NodeJS.ProcessEnv, quiet?: boolean }} [options] quiet keeps the output back and shows it only on failure
 * @returns {Promise<number>} the exit code; 127 where the command does not exist
 */
export function runCommand(command, args, { env = process.env, quiet = false } = {}) {
  return new Promise((resolve) => {
    const child = spawn(command, args, { cwd: ROOT, env, stdio: quiet ? ['ignore', 'pipe', 'pipe'] : ['ignore', 'inherit', 'inherit'] })
    /** @type {Buffer[]} */
    const kept = []
    child.stdout?.on('data', chunk => kept.push(chunk))
    child.stderr?.on('data', chunk => kept.push(chunk))
    child.on('error', (error) => {
      console.error(`${command} could not be started: ${error.message}`)
      resolve(127)
    })
    child.on('close', (code) => {
      if (quiet && code !== 0) process.stderr.write(Buffer.concat(kept))
      resolve(code ?? 1)
    })
  })
}
