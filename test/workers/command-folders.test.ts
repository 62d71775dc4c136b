import { describe, expect, it } from 'vitest';
import { folderNames } from '../../workers/command-folders';

describe('folders of several studies', () => {
  it('are named by the file, told apart where some file system would take two for one', () => {
    const paths = ['a/Anna.edf', 'b/anna.edf', 'c/anna-2.bdf', 'c/other.v2.csv'];
    expect(folderNames(paths, false)).toEqual(['Anna', 'anna-2', 'anna-2-2', 'other.v2']);
  });

  it('are numbers where results go out without identity', () => {
    expect(folderNames(['Anna.edf', 'Berta.edf'], true)).toEqual(['study-1', 'study-2']);
  });
});
