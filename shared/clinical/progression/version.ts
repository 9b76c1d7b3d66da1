/** Of the rules for the next step; stored with each proposal. */
export const progressionVersion = '1.0.0';
