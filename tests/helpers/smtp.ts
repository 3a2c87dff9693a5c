import { simpleParser, type ParsedMail } from 'mailparser'
import { SMTPServer } from 'smtp-server'
import { onTestFinished } from 'vitest'

type Behaviour = 'accept' | { refuse: number } | 'drop_after_data'

/** A real SMTP server on loopback, on a free port. Its behaviour can be changed while it runs. */
export async function startSmtpServer() {
  const received: { raw: string; mail: ParsedMail; to: string[] }[] = []
  let behaviour: Behaviour = 'accept'
  const server = new SMTPServer({
    authOptional: true,
    disabledCommands: ['STARTTLS'],
    disableReverseLookup: true,
    onData(stream, session, answer) {
      const chunks: Buffer[] = []
      stream.on('data', (chunk: Buffer) => chunks.push(chunk))
      stream.on('end', () => {
        const raw = Buffer.concat(chunks).toString('utf8')
        if (typeof behaviour === 'object') return answer(Object.assign(new Error('not now'), { responseCode: behaviour.refuse }))
        void simpleParser(raw).then((mail) => {
          received.push({ raw, mail, to: session.envelope.rcptTo.map((recipient) => recipient.address) })
          if (behaviour === 'drop_after_data') stream.destroy(new Error('dropped'))
          else answer()
        })
      })
    },
  })
  server.on('error', () => undefined)
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve))
  const address = server.server.address()
  const port = typeof address === 'object' && address ? address.port : 0
  onTestFinished(() => new Promise<void>((resolve) => server.close(() => resolve())))
  return {
    url: `smtp://127.0.0.1:${port}`,
    received,
    behave: (next: Behaviour) => {
      behaviour = next
    },
  }
}
