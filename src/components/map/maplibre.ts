import { prewarm, setWorkerUrl } from 'maplibre-gl';
import workerUrl from 'maplibre-gl/dist/maplibre-gl-worker.mjs?url';
import 'maplibre-gl/dist/maplibre-gl.css';
import './map.css';

// Once built, the library cannot find its worker beside itself.
setWorkerUrl(workerUrl);
// Its worker gets ready while the map is being made.
prewarm();
