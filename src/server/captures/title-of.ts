/** What people see of a file's name: the last part of a path that some browsers send, without control characters. */
export function cleanFileName(name: string | undefined): string {
  const last = (name ?? '').split(/[\\/]/).at(-1) ?? '';
  return (
    last
      .replace(/\p{Cc}/gu, '')
      .trim()
      .slice(0, 200) || 'capture.csv'
  );
}

/** A title for a capture that was given none: the file's name without its endings. */
export function titleOf(fileName: string): string {
  const bare = fileName.replace(/(\.(csv|txt|tsv|dat|log|gz|zip))+$/i, '').trim();
  return bare || fileName;
}
