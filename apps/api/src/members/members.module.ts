import { Module } from '@nestjs/common';
import { AccountModule } from '../account/account.module.js';
import { SessionsModule } from '../auth/sessions.module.js';
import { MembersController } from './members.controller.js';
import { MembersService } from './members.service.js';

@Module({
  imports: [AccountModule, SessionsModule],
  controllers: [MembersController],
  providers: [MembersService],
  exports: [MembersService],
})
export class MembersModule {}
