import { connectionSettings } from './client';

export default connectionSettings();
