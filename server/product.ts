import { version } from '../package.json';

export const productVersion = version;
