import { applyDecorators } from '@nestjs/common';
import { compare, hash } from 'bcryptjs';
import { IsString, MaxLength, MinLength } from 'class-validator';

/** bcrypt's cost, a quarter of a second on a machine of 2020 (common practice). */
const COST = 11;
/** bcrypt reads no more bytes than these. */
const MOST = 72;

export const hashPassword = (password: string) => hash(password, COST);

/** Compared when there is no such account, so that the answer takes as long. */
const NOBODY = '$2b$11$C6UzMDM.H6dfI/f/IKcEe.4bnvCAJv7cJHE6e1mZb9Ghkk8zCHY6y';

export const matchesPassword = (password: string, hashed = NOBODY) => compare(password, hashed);

/** A field that holds a new password. */
export const IsNewPassword = () =>
  applyDecorators(
    IsString({ message: 'must be text' }),
    MinLength(15, { message: 'must have at least 15 characters' }),
    MaxLength(MOST, { message: `must have at most ${MOST} characters` }),
  );
