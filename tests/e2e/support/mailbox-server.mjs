// A real SMTP server on loopback for all servers of the browser tests, and a page of what it received as JSON, since tests may change process.
// Use: node tests/e2e/support/mailbox-server.mjs <smtp port> <http port>
import { createServer } from 'node:http'
import { simpleParser } from 'mailparser'
import { SMTPServer } from 'smtp-server'

const [smtpPort, httpPort] = process.argv.slice(2).map(Number)
const received = []

const smtp = new SMTPServer({
  authOptional: true,
  disabledCommands: ['STARTTLS'],
  disableReverseLookup: true,
  onData(stream, session, answer) {
    simpleParser(stream).then((mail) => {
      const to = session.envelope.rcptTo.map((recipient) => recipient.address)
      received.push({ to, subject: mail.subject ?? '', text: mail.text ?? '', html: mail.html || '' })
      answer()
    }, answer)
  },
})
smtp.on('error', () => undefined)
smtp.listen(smtpPort, '127.0.0.1', () => {
  createServer((_request, response) => {
    response.setHeader('content-type', 'application/json')
    response.end(JSON.stringify(received))
  }).listen(httpPort, '127.0.0.1')
})
