/** One number of a fact: what it is of it ("" where it is all of it), and in which unit; "1" is without a unit. */
export type Measured = { readonly what: string; readonly unit: string; readonly value: number };
