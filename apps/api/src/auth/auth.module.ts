import { Module } from '@nestjs/common';
import { APP_GUARD } from '@nestjs/core';
import { JwtModule } from '@nestjs/jwt';
import { PassportModule } from '@nestjs/passport';
import { TypeOrmModule } from '@nestjs/typeorm';
import { AccountModule } from '../account/account.module.js';
import { User } from '../account/user.entity.js';
import { MembersModule } from '../members/members.module.js';
import { AuthController } from './auth.controller.js';
import { AuthGuard } from './auth.guard.js';
import { AuthService } from './auth.service.js';
import { CsrfGuard } from './csrf.guard.js';
import { JwtStrategy } from './jwt.strategy.js';
import { PasswordReset } from './password-reset.entity.js';
import { SignedInUser } from './signed-in-user.js';
import { SessionsModule } from './sessions.module.js';
import { Session } from './session.entity.js';

@Module({
  imports: [
    PassportModule,
    JwtModule.register({}),
    TypeOrmModule.forFeature([User, Session, PasswordReset]),
    SessionsModule,
    AccountModule,
    MembersModule,
  ],
  controllers: [AuthController],
  providers: [
    AuthService,
    SignedInUser,
    JwtStrategy,
    { provide: APP_GUARD, useClass: CsrfGuard },
    { provide: APP_GUARD, useClass: AuthGuard },
  ],
  exports: [AuthService, SignedInUser],
})
export class AuthModule {}
