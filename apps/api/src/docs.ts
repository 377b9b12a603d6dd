import type { NestExpressApplication } from '@nestjs/platform-express';
import { DocumentBuilder, SwaggerModule, type OpenAPIObject } from '@nestjs/swagger';

/** The OpenAPI 3.1 document of all routes. */
export function openApiDocument(app: NestExpressApplication): OpenAPIObject {
  const config = new DocumentBuilder()
    .setOpenAPIVersion('3.1.0')
    .setTitle('Heddle')
    .setDescription('Spin systems, experiments and runs of a laboratory. Errors are problem details (RFC 9457).')
    .setVersion('1.0.0')
    .addCookieAuth('heddle_access')
    .addBearerAuth({ type: 'http', description: 'a personal access token, hdl_...' })
    .build();
  return SwaggerModule.createDocument(app, config);
}

/** The document at /api/docs-json, and a page to read it at /api/docs. */
export function serveDocs(app: NestExpressApplication): void {
  SwaggerModule.setup('api/docs', app, () => openApiDocument(app), { jsonDocumentUrl: 'api/docs-json' });
}
