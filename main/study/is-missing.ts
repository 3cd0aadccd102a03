/** Whether a file operation failed because there is no such file or folder. */
export const isMissing = (error: unknown): boolean => error instanceof Error && 'code' in error && error.code === 'ENOENT'
