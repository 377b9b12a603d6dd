import { applyDecorators, HttpCode } from '@nestjs/common';
import { ApiNoContentResponse } from '@nestjs/swagger';

/** A route that answers 204. */
export const NoContent = () => applyDecorators(HttpCode(204), ApiNoContentResponse());
