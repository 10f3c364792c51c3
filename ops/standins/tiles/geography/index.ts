import { bridgeFeatures } from './bridges';
import { builtFeatures } from './built';
import { countryFeatures } from './country';
import { seaFeatures } from './depths';
import { area, type MapFeature } from './feature';
import { fieldFeatures } from './fields';
import { hinterlandFeatures } from './hinterland';
import { marshFeatures } from './marsh';
import { nameFeatures } from './names';
import { portFeatures } from './port';
import { quarryFeatures } from './quarry';
import { railwayFeatures } from './railway';
import { reliefFeatures } from './relief';
import { islands, mainland } from './shore';

/** Every feature of the invented Merrow estuary and its island; the same on every call. Within a layer, later ones lie on top. */
export function merrowEstuary(): MapFeature[] {
  return [
    ...[mainland, ...islands].map((ring) => area('landuse', { minzoom: 5 }, [ring], { class: 'land' })),
    ...seaFeatures(),
    ...countryFeatures(),
    ...hinterlandFeatures(),
    ...fieldFeatures(),
    ...reliefFeatures(),
    ...marshFeatures(),
    ...builtFeatures(),
    ...quarryFeatures(),
    ...portFeatures(),
    ...railwayFeatures(),
    ...bridgeFeatures(),
    ...nameFeatures(),
  ];
}
