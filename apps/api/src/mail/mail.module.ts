import { Global, Module } from '@nestjs/common';
import { MailCatcher } from './mail-catcher.js';
import { MailController } from './mail.controller.js';
import { MailService } from './mail.service.js';

@Global()
@Module({ controllers: [MailController], providers: [MailCatcher, MailService], exports: [MailService] })
export class MailModule {}
