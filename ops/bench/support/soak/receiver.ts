import { createServer } from 'node:http';
import { config } from '#lib/config/index';
import { makeFront, type AstroHandler } from '#ops/http/front';

/** The web's stand-in where it has not been built: the very HTTP front, which takes posts itself, without pages behind it. */
const noPages: AstroHandler = (request, response) => {
  response.status(request.path === '/healthz' ? 200 : 404).end();
};
const { host, port } = config();
createServer(makeFront(noPages, config())).listen(port, host);
process.on('SIGTERM', () => process.exit(0));
