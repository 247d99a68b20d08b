import { spawn } from 'node:child_process'
import { root } from './paths.mjs'

/**
 * Runs a command in the checkout with its output on ours, and resolves with its exit code.
 * `quiet` keeps the output back and shows it only when the command fails; 'stdout' keeps only that of the standard output back.
 */
export function runStep(command, args, { env = {}, quiet = false } = {}) {
  return new Promise((resolve, reject) => {
    const child = spawn(command, args, { cwd: root, env: { ...process.env, ...env }, stdio: ['ignore', quiet ? 'pipe' : 'inherit', quiet === true ? 'pipe' : 'inherit'] })
    const kept = []
    child.stdout?.on('data', chunk => kept.push(chunk))
    child.stderr?.on('data', chunk => kept.push(chunk))
    child.on('error', reject)
    child.on('close', (code) => {
      if (code !== 0 && quiet) process.stderr.write(Buffer.concat(kept))
      resolve(code ?? 1)
    })
  })
}

/** The same, but a failure ends this process with words. */
export async function requireStep(words, command, args, options) {
  const code = await runStep(command, args, options)
  if (code !== 0) {
    console.error(`\n${words} failed (${command} ${args.join(' ')} ended with ${code}).`)
    process.exit(1)
  }
}
