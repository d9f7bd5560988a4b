// Owns the version the command line reports, which is the package's.
// Must not know anything else.
import { version } from '../../package.json';

export const VERSION: string = version;
