import { useCallback, useEffect, useState } from 'react';

export interface Place {
  latitude: number;
  longitude: number;
}

/** Five decimals are about a metre. */
const DECIMALS = 5;

/** The place in two text fields of the page, and how to put one there. Null while they hold no place. */
export function useTypedPlace(
  latitudeId: string,
  longitudeId: string,
): [Place | null, (place: Place) => void] {
  const [place, setPlace] = useState(() => readPlace(latitudeId, longitudeId));

  useEffect(() => {
    const read = () => setPlace(readPlace(latitudeId, longitudeId));
    const fields = [fieldOf(latitudeId), fieldOf(longitudeId)];
    for (const field of fields) field?.addEventListener('input', read);
    return () => {
      for (const field of fields) field?.removeEventListener('input', read);
    };
  }, [latitudeId, longitudeId]);

  const put = useCallback(
    ({ latitude, longitude }: Place) => {
      write(latitudeId, latitude);
      write(longitudeId, longitude);
      setPlace(readPlace(latitudeId, longitudeId));
    },
    [latitudeId, longitudeId],
  );
  return [place, put];
}

function readPlace(latitudeId: string, longitudeId: string): Place | null {
  const latitude = numberIn(latitudeId, 90);
  const longitude = numberIn(longitudeId, 180);
  return latitude === null || longitude === null ? null : { latitude, longitude };
}

function numberIn(id: string, most: number): number | null {
  const text = fieldOf(id)?.value.trim().replace(',', '.').replace('\u2212', '-') ?? '';
  const value = Number(text);
  return text === '' || Number.isNaN(value) || Math.abs(value) > most ? null : value;
}

function write(id: string, value: number): void {
  const field = fieldOf(id);
  if (field) field.value = value.toFixed(DECIMALS);
}

function fieldOf(id: string): HTMLInputElement | null {
  const element = document.getElementById(id);
  return element instanceof HTMLInputElement ? element : null;
}
