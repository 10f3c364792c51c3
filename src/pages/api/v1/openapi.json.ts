import { config } from '#lib/config/index';
import { openApiDocument } from '#lib/contracts/openapi';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';

// Each contracts file registers its routes when it is loaded.
import.meta.glob('../../../lib/contracts/*.ts', { eager: true });

export const GET = route(() => json(openApiDocument(config().origin)));
