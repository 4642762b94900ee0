/** How many designs stand side by side. Apart from the schemas, so that a page loads no validator. */
export const FEWEST = 2;
export const MOST = 6;
