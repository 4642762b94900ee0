/** How many criteria a plant has at most. Apart from the schemas, so that a page loads no validator. */
export const MOST_CRITERIA = 24;
