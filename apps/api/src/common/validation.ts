import { ValidationPipe, type ValidationError } from '@nestjs/common';
import { refusedFields } from './problem.js';

/** Checks DTOs of plain routes: unknown fields are refused, every error stands at its field. */
export function validationPipe(): ValidationPipe {
  return new ValidationPipe({
    transform: true,
    whitelist: true,
    forbidNonWhitelisted: true,
    exceptionFactory: (errors) => refusedFields(errors.flatMap((error) => fieldErrors(error, ''))),
  });
}

function fieldErrors(error: ValidationError, prefix: string): { path: string; message: string }[] {
  const path = prefix === '' ? error.property : `${prefix}.${error.property}`;
  const { whitelistValidation, ...constraints } = error.constraints ?? {};
  const own = whitelistValidation ? ['unknown field'] : Object.values(constraints).slice(-1);
  return [
    ...own.map((message) => ({ path, message })),
    ...(error.children ?? []).flatMap((child) => fieldErrors(child, path)),
  ];
}
