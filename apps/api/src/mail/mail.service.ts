import { Inject, Injectable, Logger, type OnModuleDestroy } from '@nestjs/common';
import { createTransport, type Transporter } from 'nodemailer';
import { SETTINGS } from '../config/settings.module.js';
import type { Settings } from '../config/settings.js';
import { MailCatcher } from './mail-catcher.js';
import { htmlPart, textPart, type Letter } from './letter.js';

/** Sends mail over SMTP: to the server of the settings, else to the local catcher. */
@Injectable()
export class MailService implements OnModuleDestroy {
  private readonly logger = new Logger('Mail');
  private transport: Transporter | undefined;

  constructor(
    @Inject(SETTINGS) private readonly settings: Settings,
    private readonly catcher: MailCatcher,
  ) {}

  /** Throws when the mail server does not take the mail. */
  async send(letter: Letter): Promise<void> {
    this.transport ??= createTransport(this.settings.smtpUrl ?? (await this.catcher.start()));
    await this.transport.sendMail({
      from: this.settings.mailFrom,
      to: letter.to,
      subject: letter.subject,
      text: textPart(letter),
      html: htmlPart(letter),
    });
    this.logger.log(`sent "${letter.subject.replace(/[\r\n]/g, ' ')}"`);
  }

  onModuleDestroy(): void {
    this.transport?.close();
  }
}
