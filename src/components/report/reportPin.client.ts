/**
 * Puts a pin where it was heard: on a map that is fetched only when asked for, or where the phone is. What it finds goes into the
 * field for coordinates, which works without it.
 */
const DECIMALS = 5;
const NEAR_ZOOM = 15;
const FIRST_ZOOM = 12;

interface Place {
  latitude: number;
  longitude: number;
}

class ReportPin extends HTMLElement {
  private show: ((place: Place) => void) | null = null;

  connectedCallback(): void {
    this.hidden = false;
    const here = this.querySelector<HTMLButtonElement>('[data-here]');
    if (here && 'geolocation' in navigator) {
      here.addEventListener('click', () => this.takeHere(here));
    } else if (here) {
      here.hidden = true;
    }
    const open = this.querySelector<HTMLButtonElement>('[data-open]');
    open?.addEventListener('click', () => void this.openMap(open));
  }

  private get field(): HTMLInputElement | null {
    return document.querySelector<HTMLInputElement>('#field-place');
  }

  private get place(): Place | null {
    const [latitude, longitude] = (this.field?.value ?? '').split(/[\s,;]+/).map(Number);
    const isPlace = Number.isFinite(latitude) && Number.isFinite(longitude);
    return isPlace ? { latitude: latitude ?? 0, longitude: longitude ?? 0 } : null;
  }

  private put({ latitude, longitude }: Place): void {
    if (this.field) this.field.value = `${latitude.toFixed(DECIMALS)}, ${longitude.toFixed(DECIMALS)}`;
  }

  private say(name: 'failed' | 'mapFailed' | null): void {
    const told = this.querySelector('[data-told]');
    if (told) told.textContent = name === null ? '' : (this.dataset[name] ?? '');
  }

  private takeHere(button: HTMLButtonElement): void {
    button.disabled = true;
    navigator.geolocation.getCurrentPosition(
      ({ coords }) => {
        button.disabled = false;
        this.say(null);
        this.put(coords);
        this.show?.(coords);
      },
      () => {
        button.disabled = false;
        this.say('failed');
      },
      { enableHighAccuracy: true, timeout: 20_000 },
    );
  }

  private async openMap(button: HTMLButtonElement): Promise<void> {
    button.disabled = true;
    try {
      await this.makeMap();
      button.hidden = true;
    } catch {
      button.disabled = false;
      this.say('mapFailed');
    }
  }

  private async makeMap(): Promise<void> {
    const frame = this.querySelector<HTMLElement>('[data-map]');
    if (!frame) return;
    const [{ Map, Marker, NavigationControl }] = await Promise.all([
      import('maplibre-gl'),
      import('../map/maplibre'),
    ]);
    const isDark = matchMedia('(prefers-color-scheme: dark)').matches;
    const known = this.place;
    const { latitude, longitude, light, dark } = this.dataset;
    const center: [number, number] = known
      ? [known.longitude, known.latitude]
      : [Number(longitude), Number(latitude)];
    frame.hidden = false;
    const map = new Map({
      container: frame,
      style: (isDark ? dark : light) ?? '',
      center,
      zoom: known ? NEAR_ZOOM : FIRST_ZOOM,
      dragRotate: false,
      attributionControl: { compact: true },
    });
    map.addControl(new NavigationControl({ showCompass: false }));
    const marker = new Marker({ draggable: true });
    this.show = (place) => {
      marker.setLngLat([place.longitude, place.latitude]).addTo(map);
      if (!map.getBounds().contains([place.longitude, place.latitude])) {
        map.jumpTo({ center: [place.longitude, place.latitude], zoom: NEAR_ZOOM });
      }
    };
    const take = (lng: number, lat: number) => {
      const place = { latitude: lat, longitude: lng };
      this.put(place);
      this.show?.(place);
    };
    map.on('click', ({ lngLat }) => take(lngLat.lng, lngLat.lat));
    marker.on('dragend', () => take(marker.getLngLat().lng, marker.getLngLat().lat));
    if (known) this.show(known);
  }
}

customElements.define('report-pin', ReportPin);
