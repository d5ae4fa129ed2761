/**
 * The program's version, as findings' fingerprints and referee copies carry it: the same as in
 * package.json (a test compares them). A version that finds other digits needs another number.
 */
export const PROGRAM_VERSION = "0.1.0";
