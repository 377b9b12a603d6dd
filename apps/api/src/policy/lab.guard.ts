import {
  applyDecorators,
  createParamDecorator,
  Injectable,
  SetMetadata,
  type CanActivate,
  type ExecutionContext,
} from '@nestjs/common';
import { Reflector } from '@nestjs/core';
import { ApiExtension } from '@nestjs/swagger';
import { InjectRepository } from '@nestjs/typeorm';
import type { Request } from 'express';
import { Repository } from 'typeorm';
import { isUuid } from '../common/ids.js';
import { forbidden, notFound } from '../common/problem.js';
import { Membership } from '../members/membership.entity.js';
import { may, mayEver, type Action, type Role } from './policy.js';

/** Who asks, in which lab and with which role; the first argument of every service method of a lab. */
export interface LabContext {
  readonly userId: string;
  readonly labId: string;
  readonly role: Role;
}

const ACTION = 'heddle:action';

/** Names the action of a route below /labs/:labId; without it nobody gets in. */
export const Can = (action: Action) => applyDecorators(SetMetadata(ACTION, action), ApiExtension('x-action', action));

/** The LabContext of the request. */
export const InLab = createParamDecorator((_: unknown, context: ExecutionContext): LabContext => {
  const { lab } = context.switchToHttp().getRequest<Request & { lab?: LabContext }>();
  if (!lab) throw new Error('InLab needs the LabGuard');
  return lab;
});

/** Lets members of the lab in the address through whose role may do the route's action. A stranger is told nothing: 404. */
@Injectable()
export class LabGuard implements CanActivate {
  constructor(
    private readonly reflector: Reflector,
    @InjectRepository(Membership) private readonly memberships: Repository<Membership>,
  ) {}

  async canActivate(context: ExecutionContext): Promise<boolean> {
    const request = context.switchToHttp().getRequest<Request & { lab?: LabContext; user?: { userId: string } }>();
    const action = this.reflector.get<Action | undefined>(ACTION, context.getHandler());
    const labId = String(request.params.labId);
    const userId = request.user?.userId;
    const membership = userId && isUuid(labId) ? await this.memberships.findOneBy({ labId, userId }) : null;
    if (!membership || !userId) throw notFound('lab');
    if (!action || !mayEver(membership.role, action)) throw forbidden('Your role in this lab does not allow that.');
    request.lab = { userId, labId, role: membership.role };
    return true;
  }
}

/** Refuses unless the asker may do `action` on a thing owned by `ownerId`. */
export function requireMay(context: LabContext, action: Action, ownerId: string): void {
  if (!may(context.role, action, ownerId === context.userId)) {
    throw forbidden('Only the owner, or a role that stands above, may do that.');
  }
}
