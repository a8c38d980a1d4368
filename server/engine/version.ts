/** Kept with every identification. Raised whenever an outcome could differ. */
export const engineVersion = '1.0.0';
export const atlasVersion = '1.0.0';
