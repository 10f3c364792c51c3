import { callApi, methodsOf, routePatterns } from './callApi';
import type { Components, Schema } from './fromSchema';

/** A parameter of a route's address. */
export interface Parameter {
  name: string;
  in: 'path' | 'query' | 'header' | 'cookie';
  required?: boolean;
  schema?: Schema;
}

/** A route of the interface, as its description has it. */
export interface Described {
  method: string;
  /** As the files that make it: `/api/v1/networks/[network]/stations`. */
  pattern: string;
  parameters: Parameter[];
  /** Of a JSON body; undefined where there is none, or of another type. */
  body: Schema | undefined;
  /** Of a body that is not JSON. */
  bodyType: string | undefined;
}

interface Operation {
  parameters?: Parameter[];
  requestBody?: { content: Record<string, { schema?: Schema }> };
}

interface Document {
  paths: Record<string, Record<string, Operation>>;
  components: { schemas: Components };
}

/** The same answer as another type, by the end of the address. */
const OTHER_TYPE = /\.(csv|geojson)$/;

/** Every route that the OpenAPI document describes, and every one that it forgot, which is an error of the document. */
export async function describedRoutes(): Promise<{
  routes: Described[];
  components: Components;
  forgotten: string[];
}> {
  const document = (await (await callApi('GET', '/api/v1/openapi.json')).json()) as Document;
  const routes = Object.entries(document.paths).flatMap(([path, operations]) =>
    Object.entries(operations).map(([method, operation]) => described(path, method.toUpperCase(), operation)),
  );
  const known = new Set(routes.map(({ method, pattern }) => `${method} ${pattern}`));
  const forgotten: string[] = [];
  for (const pattern of routePatterns().filter((one) => one.startsWith('/api/'))) {
    for (const method of await methodsOf(pattern)) {
      if (known.has(`${method} ${pattern}`)) continue;
      const same = routes.find(
        (one) => one.method === method && one.pattern === pattern.replace(OTHER_TYPE, ''),
      );
      if (same) routes.push({ ...same, pattern });
      else forgotten.push(`${method} ${pattern}`);
    }
  }
  return { routes, components: document.components.schemas, forgotten };
}

function described(path: string, method: string, { parameters = [], requestBody }: Operation): Described {
  const content = Object.entries(requestBody?.content ?? {});
  const json = content.find(([type]) => type === 'application/json');
  return {
    method,
    pattern: path.replace(/\{(\w+)\}/g, '[$1]'),
    parameters,
    body: json?.[1].schema,
    bodyType: content[0]?.[0],
  };
}
