/** Why a folder cannot be read as a file. */
export const IS_FOLDER = 'it is a folder, not a file';

const REASONS: Readonly<Record<string, string>> = {
  ENOENT: 'there is no such file or folder',
  EACCES: 'permission is denied',
  EPERM: 'the operation is not permitted',
  EISDIR: IS_FOLDER,
  ENOTDIR: 'a part of its path is a file, not a folder',
  EEXIST: 'a file of that name is in the way',
  EROFS: 'the file system can only be read',
  ENOSPC: 'the disk is full',
  EDQUOT: 'the disk quota is used up',
  EMFILE: 'too many files are open',
  ENAMETOOLONG: 'the name is too long',
  ELOOP: 'its links lead in a circle',
  EIO: 'the disk reports an error',
};

/**
 * Why the operating system refused a file, in words; null for anything that is not a refusal by the operating system,
 * which is then a defect of ours and must be thrown on.
 */
export function refusalReason(error: unknown): string | null {
  if (!(error instanceof Error) || !('syscall' in error) || !('code' in error)) return null;
  const code = String(error.code);
  return REASONS[code] ?? `the system says ${code}`;
}
