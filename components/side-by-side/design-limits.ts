/** How many designs stand side by side. Apart from the reading of addresses, so that the page loads no validator. */
export const FEWEST = 2;
export const MOST = 6;
