// Runs first in a worker thread that is started from sources: the loader of the main thread is not passed on to it.
import { register } from 'tsx/esm/api';

register();
