/** The version of the arithmetic. A tablet and a server that differ in it both keep their results. */
export const DOMAIN_VERSION = '1.2.0';
