import { fileURLToPath } from 'node:url';

/** Path of something in the project, by its path from the project's folder. Source and built bench lie equally deep. */
export const pathOf = (inProject: string): string =>
  fileURLToPath(new URL(`../../${inProject}`, import.meta.url));
