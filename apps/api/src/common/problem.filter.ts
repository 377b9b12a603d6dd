import { Catch, HttpException, HttpStatus, Logger, type ArgumentsHost, type ExceptionFilter } from '@nestjs/common';
import { DocumentRefused, EngineError, type EngineErrorCode } from '@heddle/shared';
import type { Request, Response } from 'express';
import { fieldProblem, Problem, refusedFields, type ProblemDetails } from './problem.js';

/** A new code of the engine does not compile until it has a status. */
const ENGINE_STATUS: Record<EngineErrorCode, HttpStatus> = {
  TOO_LARGE: HttpStatus.UNPROCESSABLE_ENTITY,
  UNSUPPORTED: HttpStatus.UNPROCESSABLE_ENTITY,
  NO_CONVERGENCE: HttpStatus.INTERNAL_SERVER_ERROR,
  CANCELLED: HttpStatus.CONFLICT,
};

/** The one place that turns errors into problem details (RFC 9457). */
@Catch()
export class ProblemFilter implements ExceptionFilter {
  private readonly logger = new Logger('Problem');

  catch(error: unknown, host: ArgumentsHost): void {
    const request = host.switchToHttp().getRequest<Request>();
    const response = host.switchToHttp().getResponse<Response>();
    const problem = toProblem(error);
    if (problem.getStatus() >= 500) this.logger.error(error instanceof Error ? error.stack : String(error));
    if (response.headersSent) {
      response.end();
      return;
    }
    const status = problem.getStatus();
    const details: ProblemDetails = {
      type: `/problems/${problem.kind}`,
      title: HttpStatus[status].toLowerCase().replaceAll('_', ' '),
      status,
      detail: problem.message,
      instance: request.originalUrl.split('?')[0],
      ...problem.extensions,
    };
    response.status(status).type('application/problem+json').send(JSON.stringify(details));
  }
}

function toProblem(error: unknown): Problem {
  if (error instanceof Problem) return error;
  if (error instanceof DocumentRefused) return refusedFields(error.errors, error.document);
  if (error instanceof EngineError) {
    const errors = error.path ? [fieldProblem(error.path, error.message)] : undefined;
    return new Problem(ENGINE_STATUS[error.code], error.code.toLowerCase().replace('_', '-'), error.message, {
      errors,
    });
  }
  if (error instanceof HttpException && error.getStatus() === 429) {
    return new Problem(429, 'too-many', 'Too many tries from this address. Wait a minute and try again.');
  }
  if (error instanceof HttpException) return new Problem(error.getStatus(), 'http', error.message);
  if (isBodyError(error)) return new Problem(error.status, 'body', error.message);
  return new Problem(
    HttpStatus.INTERNAL_SERVER_ERROR,
    'unexpected',
    'Something went wrong on the server. It has been noted.',
  );
}

/** Errors of the body parser: no JSON, or too large. */
function isBodyError(error: unknown): error is Error & { status: number } {
  return error instanceof Error && 'status' in error && typeof error.status === 'number' && error.status < 500;
}
