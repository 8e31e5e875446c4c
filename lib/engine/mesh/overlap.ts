/** Bodies whose limit surfaces pass through each other, so that their common volume would be weighed twice. */
export const OVERLAP = 'overlap';
