/** A release state as a sentence says it; a word that is not known is shown as it came. */
export const releaseStateText = (state: string): string => state.replace('-', ' ');
