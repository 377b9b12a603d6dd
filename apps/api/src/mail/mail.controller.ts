import { Controller, Get, Header, Inject, Req } from '@nestjs/common';
import { ApiExcludeController } from '@nestjs/swagger';
import type { Request } from 'express';
import { Public } from '../auth/principal.js';
import { notFound } from '../common/problem.js';
import { SETTINGS } from '../config/settings.module.js';
import type { Settings } from '../config/settings.js';
import { escapeHtml } from './letter.js';
import { MailCatcher, type CaughtMail } from './mail-catcher.js';

/** The page where caught mails are read. Only without a mail server, and only from this machine. */
@ApiExcludeController()
@Public()
@Controller('mail')
export class MailController {
  constructor(
    @Inject(SETTINGS) private readonly settings: Settings,
    private readonly catcher: MailCatcher,
  ) {}

  @Get()
  @Header('content-type', 'text/html; charset=utf-8')
  page(@Req() request: Request): string {
    this.requireLocal(request);
    const mails = this.catcher.list();
    const body =
      mails.length > 0 ? mails.map(article).join('') : '<p>No mail yet. What Heddle sends shows up here.</p>';
    return `<!doctype html><html lang="en"><head><meta charset="utf-8"><title>Caught mail</title><meta name="viewport" content="width=device-width"><style>${STYLE}</style></head><body><main><h1>Caught mail</h1>${body}</main></body></html>`;
  }

  @Get('messages')
  messages(@Req() request: Request): readonly CaughtMail[] {
    this.requireLocal(request);
    return this.catcher.list();
  }

  private requireLocal({ socket }: Request): void {
    const local = ['127.0.0.1', '::1', '::ffff:127.0.0.1'].includes(socket.remoteAddress ?? '');
    if (this.settings.smtpUrl !== undefined || !local) throw notFound('page');
  }
}

const STYLE =
  'body{font:16px/1.5 system-ui,sans-serif;margin:2rem auto;max-width:44rem;padding:0 1rem;color:#2a2520;background:#f7f3ec}' +
  'article{border-top:1px solid #b9ad9b;padding:1rem 0}h2{font-size:1.05rem;margin:0}p{margin:.3rem 0;white-space:pre-wrap;overflow-wrap:anywhere}';

function article({ to, subject, receivedAt, text }: CaughtMail): string {
  const words = escapeHtml(text).replace(/https?:\/\/\S+/g, (url) => `<a href="${url}">${url}</a>`);
  return `<article><h2>${escapeHtml(subject)}</h2><p>to ${escapeHtml(to)}, ${receivedAt.toISOString()}</p><p>${words}</p></article>`;
}
