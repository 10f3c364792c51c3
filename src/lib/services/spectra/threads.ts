import { type HeavyRead } from '../reading/readHeavy';
import { JobThread } from '../threads/jobThread';
import { type SearchResult, type SearchTask } from './searchTask';

/** Searches of this process follow each other in one thread. */
export const searches = new JobThread<SearchTask, HeavyRead<SearchResult>>(
  'src/lib/services/spectra/searchThread.ts',
);
