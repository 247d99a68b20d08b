import { writeTransaction } from './database'

/** What takes a rehearsal back. */
class TakenBack extends Error {}

/** What `work` answers, with nothing of what it wrote: its transaction is taken back. Not to be called inside another one. */
export async function rehearse<Answer>(work: () => Promise<Answer>): Promise<Answer> {
  const answers: Answer[] = []
  await writeTransaction(async () => {
    answers.push(await work())
    throw new TakenBack()
  }).catch((error: unknown) => {
    if (!(error instanceof TakenBack)) throw error
  })
  return answers[0] as Answer
}
