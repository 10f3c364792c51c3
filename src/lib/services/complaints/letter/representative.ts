import { distanceInWords } from '../whereabouts';
import { standingOf } from '../pack/representative';
import { nearestOf, type LetterFacts } from './facts';

/** How far the nearest station may speak for the resident's place; nothing where it stands near, or has no data to speak with. */
export function representativeParagraph(facts: LetterFacts): string {
  const nearest = nearestOf(facts);
  if (!nearest) return '';
  const { verdict, distanceM } = standingOf(nearest, facts.whereabouts[nearest.station] ?? null);
  switch (verdict) {
    case 'area':
      return (
        `It stands ${distanceInWords(distanceM ?? 0)} from where you heard the sound. Its figures tell what could be heard in the ` +
        'area rather than what reached you.'
      );
    case 'far':
      return (
        `It stands ${distanceInWords(distanceM ?? 0)} from where you heard the sound, too far to tell what reached you. Please take its ` +
        'figures as a description of that place only: they neither confirm nor rule out what you heard.'
      );
    case 'unknown-place':
      return 'We do not know exactly where you heard the sound, so we cannot say how far this station speaks for that place.';
    default:
      return '';
  }
}
