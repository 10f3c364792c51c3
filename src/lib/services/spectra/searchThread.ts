import { readHeavy, type HeavyRead } from '../reading/readHeavy';
import { serveJobs } from '../threads/serveJobs';
import { SearchRun } from './runSearch';
import { type SearchResult, type SearchTask } from './searchTask';

serveJobs<SearchTask, HeavyRead<SearchResult>>((task, watch) =>
  readHeavy(() => new SearchRun(task, watch).result()),
);
