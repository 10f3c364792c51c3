import { OpenApiGeneratorV31 } from '@asteasolutions/zod-to-openapi';
import { registry } from './registry';

/** The OpenAPI 3.1 document of every route that has been registered; the caller loads the contracts files first. */
export function openApiDocument(origin: string) {
  return new OpenApiGeneratorV31(registry.definitions).generateDocument({
    openapi: '3.1.0',
    info: {
      title: 'Bittern',
      version: '1',
      description:
        'Levels in dB re 20 µPa as numbers, times RFC 3339, frequencies by nominal Hz, periods half-open (from <= t < to). ' +
        'Where no interval contributes a level is null. Figures, days, spectrograms and intervals may come from a replica: the header Data-As-Of says up to when it has everything.',
    },
    servers: [{ url: origin }],
  });
}
