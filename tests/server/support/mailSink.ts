import { createServer, type Socket } from 'node:net'
import type { AddressInfo } from 'node:net'

export interface TakenMail {
  to: string
  messageId: string
  /** Header lines and body, as they came over the wire. */
  raw: string
}

/** A mail server that takes everything over and keeps it (as much of RFC 5321 as nodemailer needs). */
export interface MailSink {
  url: string
  taken: readonly TakenMail[]
  close(): Promise<void>
}

export async function startMailSink(): Promise<MailSink> {
  const taken: TakenMail[] = []
  const sockets = new Set<Socket>()
  const server = createServer((socket) => {
    sockets.add(socket)
    socket.on('close', () => sockets.delete(socket))
    socket.on('error', () => socket.destroy())
    serve(socket, taken)
  })
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve))
  return {
    url: `smtp://127.0.0.1:${(server.address() as AddressInfo).port}`,
    taken,
    close: () =>
      new Promise((resolve) => {
        for (const socket of sockets) socket.destroy()
        server.close(() => resolve())
      }),
  }
}

function serve(socket: Socket, taken: TakenMail[]): void {
  let waiting = ''
  let data: string[] | null = null
  let to = ''
  const say = (line: string) => socket.write(`${line}\r\n`)
  socket.setEncoding('utf8')
  socket.on('data', (chunk: string) => {
    waiting += chunk
    const lines = waiting.split('\r\n')
    waiting = lines.pop() ?? ''
    for (const line of lines) {
      if (data === null) command(line)
      else if (line !== '.') data.push(line)
      else {
        const raw = data.join('\n')
        taken.push({ to, raw, messageId: /^message-id:\s*<(.+)>/im.exec(raw)?.[1] ?? '' })
        data = null
        say('250 taken')
      }
    }
  })
  const command = (line: string) => {
    const verb = line.slice(0, 4).toUpperCase()
    if (verb === 'RCPT') to = /<(.+)>/.exec(line)?.[1] ?? ''
    if (verb === 'DATA') {
      data = []
      say('354 go on')
    } else if (verb === 'QUIT') {
      say('221 bye')
      socket.end()
    } else say('250 well')
  }
  say('220 sink')
}
