import { expect } from '@playwright/test'
import { MAILBOX_URL } from './places'

export type Received = { to: string[]; subject: string; text: string; html: string }

async function receivedBy(address: string): Promise<Received[]> {
  const all = (await (await fetch(MAILBOX_URL)).json()) as Received[]
  return all.filter((mail) => mail.to.includes(address))
}

/** The newest message to this address whose subject matches, once it has come over SMTP. The server sends every few seconds, looks for lists every minute. */
export async function waitForMail(address: string, subject: RegExp, timeout = 45_000): Promise<Received> {
  let found: Received | undefined
  await expect
    .poll(
      async () => {
        found = (await receivedBy(address)).filter((mail) => subject.test(mail.subject)).at(-1)
        return found !== undefined
      },
      { timeout, message: `a message to ${address} whose subject matches ${subject}` },
    )
    .toBe(true)
  if (!found) throw new Error('No message came.')
  return found
}

export async function countMail(address: string, subject: RegExp): Promise<number> {
  return (await receivedBy(address)).filter((mail) => subject.test(mail.subject)).length
}

/** The one link of a message. */
export function linkOf(mail: Received): string {
  const link = /https?:\/\/\S+/.exec(mail.text)?.[0]
  if (!link) throw new Error('The message has no link.')
  return link
}
