import { Module } from '@nestjs/common';
import { TypeOrmModule } from '@nestjs/typeorm';
import { SessionsModule } from '../auth/sessions.module.js';
import { AccountController } from './account.controller.js';
import { AccountService } from './account.service.js';
import { PeopleService } from './people.service.js';
import { PersonalToken } from './personal-token.entity.js';
import { TokensService } from './tokens.service.js';
import { User } from './user.entity.js';

@Module({
  imports: [TypeOrmModule.forFeature([User, PersonalToken]), SessionsModule],
  controllers: [AccountController],
  providers: [AccountService, TokensService, PeopleService],
  exports: [AccountService, TokensService, PeopleService],
})
export class AccountModule {}
