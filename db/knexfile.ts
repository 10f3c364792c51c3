import { connectionSettings } from './settings';

export default connectionSettings();
