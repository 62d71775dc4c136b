import type { RefObject } from 'react';

interface FileInputProps {
  /** For the button that opens it. */
  readonly input: RefObject<HTMLInputElement | null>;
  readonly label: string;
  readonly accept: string;
  readonly onFile: (file: File) => void;
}

/** The browser's own way to choose a file, out of sight behind a button; the same file may be chosen twice. */
export function FileInput({ input, label, accept, onFile }: FileInputProps) {
  return (
    <input
      ref={input}
      type="file"
      accept={accept}
      hidden
      aria-label={label}
      onChange={({ target }) => {
        const file = target.files?.[0];
        target.value = '';
        if (file) onFile(file);
      }}
    />
  );
}
