import { build } from '../../src/cli/build.js';

/** Builds what the tests drive, unless the build at hand is younger than everything it is made of. */
export default build;
