/** Whether this browser can draw the map: it needs WebGL 2. */
export function hasWebGl(): boolean {
  try {
    return document.createElement('canvas').getContext('webgl2') !== null;
  } catch {
    return false;
  }
}

/** Whether it is worth trying: to ask for a context only to know costs as much as the map's own. */
export function knowsWebGl(): boolean {
  return 'WebGL2RenderingContext' in globalThis;
}
