import type { AddressInfo } from 'node:net';
import { Injectable, type OnModuleDestroy } from '@nestjs/common';
import { simpleParser } from 'mailparser';
import { SMTPServer } from 'smtp-server';

export interface CaughtMail {
  id: number;
  to: string;
  subject: string;
  receivedAt: Date;
  text: string;
  html: string;
}

/** Mails kept, the oldest go first. */
const KEPT = 200;

/** An SMTP server on loopback that keeps what it gets, for when no mail server is set. */
@Injectable()
export class MailCatcher implements OnModuleDestroy {
  private server: SMTPServer | undefined;
  private next = 1;
  private mails: CaughtMail[] = [];

  /** Listens on a free port and returns its smtp:// address. */
  async start(): Promise<string> {
    const server = new SMTPServer({
      authOptional: true,
      disabledCommands: ['AUTH', 'STARTTLS'],
      onData: (stream, _session, done) => {
        simpleParser(stream).then(
          (mail) => {
            const to = [mail.to ?? []]
              .flat()
              .map(({ text }) => text)
              .join(', ');
            const html = typeof mail.html === 'string' ? mail.html : '';
            this.mails.unshift({
              id: this.next++,
              to,
              subject: mail.subject ?? '',
              receivedAt: new Date(),
              text: mail.text ?? '',
              html,
            });
            this.mails.length = Math.min(this.mails.length, KEPT);
            done();
          },
          (error: Error) => done(error),
        );
      },
    });
    this.server = server;
    await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
    return `smtp://127.0.0.1:${(server.server.address() as AddressInfo).port}`;
  }

  /** Newest first. */
  list(): readonly CaughtMail[] {
    return this.mails;
  }

  onModuleDestroy(): void {
    this.server?.close();
  }
}
