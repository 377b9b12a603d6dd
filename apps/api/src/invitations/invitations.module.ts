import { Module } from '@nestjs/common';
import { TypeOrmModule } from '@nestjs/typeorm';
import { AccountModule } from '../account/account.module.js';
import { User } from '../account/user.entity.js';
import { AuthModule } from '../auth/auth.module.js';
import { SessionsModule } from '../auth/sessions.module.js';
import { Lab } from '../labs/lab.entity.js';
import { MembersModule } from '../members/members.module.js';
import { Invitation } from './invitation.entity.js';
import { InvitationController, LabInvitationsController } from './invitations.controller.js';
import { InvitationsService } from './invitations.service.js';

@Module({
  imports: [
    TypeOrmModule.forFeature([Invitation, Lab, User]),
    AccountModule,
    MembersModule,
    SessionsModule,
    AuthModule,
  ],
  controllers: [LabInvitationsController, InvitationController],
  providers: [InvitationsService],
})
export class InvitationsModule {}
