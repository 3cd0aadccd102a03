/** Ending of the file that holds a whole study. */
export const savedCopySuffix = '.rampfold'
