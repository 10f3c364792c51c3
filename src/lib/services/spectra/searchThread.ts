import { serveJobs } from '../threads/serveJobs';
import { SearchRun } from './runSearch';
import { type SearchResult, type SearchTask } from './searchTask';

serveJobs<SearchTask, SearchResult>((task, watch) => new SearchRun(task, watch).result());
