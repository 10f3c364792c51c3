import { OpenAPIRegistry, type RouteConfig } from '@asteasolutions/zod-to-openapi';
import { problemSchema } from './common';

/** Collects every route of the interface; each contracts file registers its own. */
export const registry = new OpenAPIRegistry();

registry.registerComponent('securitySchemes', 'accessToken', {
  type: 'http',
  scheme: 'bearer',
  description: "A person's access token, with that person's roles.",
});
registry.registerComponent('securitySchemes', 'stationToken', {
  type: 'http',
  scheme: 'bearer',
  description: "A station's token, shown once when it is made.",
});
registry.registerComponent('securitySchemes', 'mastToken', {
  type: 'http',
  scheme: 'bearer',
  description: "A weather mast's token, shown once when it is made.",
});
registry.registerComponent('securitySchemes', 'session', {
  type: 'apiKey',
  in: 'cookie',
  name: 'bittern-session',
});

export type Access = 'person' | 'station' | 'mast' | 'anyone';

const SECURITY: Record<Access, RouteConfig['security']> = {
  person: [{ session: [] }, { accessToken: [] }],
  station: [{ stationToken: [] }],
  mast: [{ mastToken: [] }],
  anyone: [],
};

/** Registers a route: who may call it, and that every refusal is problem details. */
export function registerRoute({ access, ...route }: RouteConfig & { access: Access }): void {
  const problem = {
    description: 'Refused; the problem says why.',
    content: { 'application/problem+json': { schema: problemSchema } },
  };
  registry.registerPath({
    ...route,
    security: SECURITY[access],
    responses: { ...route.responses, default: problem },
  });
}
