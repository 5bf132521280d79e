import express, { type Express } from 'express'
import { simpleParser } from 'mailparser'
import { SMTPServer } from 'smtp-server'
import { escapeHtml, page, pageHeaders } from './html.ts'

/** A stand-in for the mail server: takes every letter, sends none on, shows them all on a page. */
export interface MailServer {
  smtp: SMTPServer
  inbox: Express
}

interface Letter {
  id: number
  receivedAt: string
  from: string
  to: string[]
  subject: string
  text: string
}

const KEPT = 500

export function mailServer(): MailServer {
  const letters: Letter[] = []
  let count = 0
  const smtp = new SMTPServer({
    authOptional: true,
    disabledCommands: ['STARTTLS'],
    onData(stream, { envelope }, done) {
      simpleParser(stream).then((parsed) => {
        letters.unshift({
          id: ++count,
          receivedAt: new Date().toISOString(),
          from: parsed.from?.text ?? '',
          to: envelope.rcptTo.map(({ address }) => address),
          subject: parsed.subject ?? '',
          text: parsed.text ?? '',
        })
        letters.length = Math.min(letters.length, KEPT)
        done()
      }, done)
    },
  })
  return { smtp, inbox: inboxPages(letters) }
}

/** Newest first; `?to=` keeps one recipient's. `/letters.json` is the same for tests. */
function inboxPages(letters: Letter[]): Express {
  const app = express()
  app.disable('x-powered-by')
  const shown = (to: unknown) =>
    typeof to === 'string' && to !== '' ? letters.filter((letter) => letter.to.includes(to)) : letters
  app.get('/letters.json', (req, res) => {
    res.set(pageHeaders).json({ items: shown(req.query.to) })
  })
  app.get('/', (req, res) => {
    const body = shown(req.query.to).map(letterHtml).join('\n')
    res.set(pageHeaders).send(page('Inbox of the laboratory', body || '<p>No letter yet.</p>'))
  })
  return app
}

function letterHtml({ receivedAt, from, to, subject, text }: Letter): string {
  return `<article><strong>${escapeHtml(subject)}</strong><br>
<small>to ${escapeHtml(to.join(', '))}, from ${escapeHtml(from)}, ${escapeHtml(receivedAt)}</small>
<pre>${escapeHtml(text)}</pre></article>`
}
