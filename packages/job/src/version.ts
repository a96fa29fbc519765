/** The version of all packages, which share one. A test holds it equal to their package.json. */
export const VERSION = '0.1.0';
