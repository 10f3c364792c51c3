import { SharingWorker } from './sharingWorker';

/** This process among the workers. */
export const thisWorker = new SharingWorker();
