/** What the operating system's answers mean. */
export const fileFaults: Readonly<Record<string, string>> = {
  EEXIST: 'it exists already',
  ENOENT: 'it does not exist, or its folder does not',
  EACCES: 'permission denied',
  EPERM: 'permission denied',
  EROFS: 'the file system is read-only',
  EISDIR: 'it is a folder',
  ENOTDIR: 'a part of the path is not a folder',
  ENOSPC: 'no space left',
  EDQUOT: 'no space left within the quota',
  ENAMETOOLONG: 'the name is too long',
  EMFILE: 'too many open files',
};

/** An answer of the operating system in words; what is no such answer is thrown. */
export function fileFault(error: unknown): string {
  const code = (error as NodeJS.ErrnoException).code;
  if (code === undefined) throw error;
  return fileFaults[code] ?? code;
}
