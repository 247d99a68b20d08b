import { hash, verify } from '@node-rs/argon2'
import PQueue from 'p-queue'

/** `Algorithm.Argon2id` of the package, whose const enum cannot be imported file by file. */
const argon2id = 2

/** Argon2id; memory in KiB. Over the least that the OWASP Password Storage Cheat Sheet (2026) asks for. */
const settings = { algorithm: argon2id, memoryCost: 65_536, timeCost: 3, parallelism: 4 }

/** Each hash takes 64 MiB and several threads: two at once, the others wait. */
const hashing = new PQueue({ concurrency: 2 })

/** The hash of a password as it is stored, settings and salt included. */
export const hashPassword = (password: string): Promise<string> => hashing.add(() => hash(password, settings))

/** Whether a password fits a stored hash. */
export const verifyPassword = (stored: string, password: string): Promise<boolean> => hashing.add(() => verify(stored, password))

let nobody: Promise<string> | undefined

/** Takes as long as `verifyPassword` and always says no: for accounts that do not exist, so that the time tells nothing. */
export async function verifyAgainstNobody(password: string): Promise<false> {
  nobody ??= hashPassword('the password of nobody')
  await verifyPassword(await nobody, password)
  return false
}
