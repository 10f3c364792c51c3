import { builtFeatures } from './built';
import { seaFeatures } from './depths';
import { area, type MapFeature } from './feature';
import { fieldFeatures } from './fields';
import { hinterlandFeatures } from './hinterland';
import { marshFeatures } from './marsh';
import { nameFeatures } from './names';
import { portFeatures } from './port';
import { quarryFeatures } from './quarry';
import { railwayFeatures } from './railway';
import { islands, mainland } from './shore';
import { woodFeatures } from './woods';

/** Every feature of the invented Merrow estuary and its island; the same on every call. Within a layer, later ones lie on top. */
export function merrowEstuary(): MapFeature[] {
  return [
    ...[mainland, ...islands].map((ring) => area('landuse', { minzoom: 5 }, [ring], { class: 'land' })),
    ...seaFeatures(),
    ...hinterlandFeatures(),
    ...fieldFeatures(),
    ...woodFeatures(),
    ...marshFeatures(),
    ...builtFeatures(),
    ...quarryFeatures(),
    ...portFeatures(),
    ...railwayFeatures(),
    ...nameFeatures(),
  ];
}
