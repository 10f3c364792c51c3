import { createServer } from 'node:http';
import { listen, stopOnSignal, urlOf } from '../listening';
import { tilesApp } from './app';
import { merrowEstuary } from './geography/index';
import { tilesSettings } from './settings';
import { TileSet } from './tileSet';

const settings = tilesSettings(process.env);
const server = createServer();
const tiles = new TileSet(merrowEstuary());
server.on(
  'request',
  tilesApp(tiles, () => settings.publicUrl ?? urlOf(server)),
);
await listen(server, settings.host, settings.port, 'BITTERN_TILES_PORT');
stopOnSignal([server]);
console.log(`Map tiles of the Merrow estuary (${tiles.version}) at ${urlOf(server)}`);
