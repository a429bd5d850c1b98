import { createServer, type Socket } from 'node:net';
import type { AddressInfo } from 'node:net';

export interface CaughtMail {
  readonly from: string;
  readonly to: string;
  /** Headers and bodies as they came over the line. */
  readonly source: string;
}

export interface MailCatcher {
  /** For MAIL_URL. */
  readonly url: string;
  readonly mails: readonly CaughtMail[];
  /** While true every letter is turned away for now. */
  refuse: boolean;
  stop(): Promise<void>;
}

/** A mail server that keeps what it is given: as much of SMTP (RFC 5321) as a client needs to hand over a letter. */
export async function catchMail(): Promise<MailCatcher> {
  const mails: CaughtMail[] = [];
  const catcher = { refuse: false };
  const sockets = new Set<Socket>();
  const server = createServer((socket) => {
    sockets.add(socket);
    socket.on('close', () => sockets.delete(socket));
    converse(socket, mails, catcher);
  });
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
  const { port } = server.address() as AddressInfo;
  return Object.assign(catcher, {
    url: `smtp://127.0.0.1:${port}?ignoreTLS=true`,
    mails,
    stop: () =>
      new Promise<void>((resolve) => {
        for (const socket of sockets) socket.destroy();
        server.close(() => resolve());
      }),
  });
}

function converse(socket: Socket, mails: CaughtMail[], catcher: { readonly refuse: boolean }): void {
  let [from, to, data, buffer] = ['', '', null as string[] | null, ''];
  const say = (line: string) => socket.write(`${line}\r\n`);
  const address = (line: string) => /<([^>]*)>/u.exec(line)?.[1] ?? '';
  const hear = (line: string): unknown => {
    if (data !== null) {
      if (line !== '.') return data.push(line.replace(/^\.\./u, '.'));
      mails.push({ from, to, source: data.join('\n') });
      data = null;
      return say('250 kept');
    }
    const verb = line.slice(0, 4).toUpperCase();
    if (verb === 'MAIL') [from, to] = [address(line), ''];
    if (verb === 'RCPT') {
      if (catcher.refuse) return say('451 come back later');
      to = address(line);
    }
    if (verb === 'DATA') {
      data = [];
      return say('354 go on');
    }
    return say(verb === 'QUIT' ? '221 bye' : '250 well');
  };
  socket.on('error', () => socket.destroy());
  socket.on('data', (chunk) => {
    buffer += chunk.toString('utf8');
    for (let end = buffer.indexOf('\r\n'); end !== -1; end = buffer.indexOf('\r\n')) {
      const line = buffer.slice(0, end);
      buffer = buffer.slice(end + 2);
      hear(line);
    }
  });
  say('220 catcher');
}
