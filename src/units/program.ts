/** Name and version of the program as sessions, signatures and exports carry it; a test holds it to package.json. */
export const PROGRAM = 'Bicadence 0.1.0';
