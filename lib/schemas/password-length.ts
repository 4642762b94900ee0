/** Apart from the schemas, so that a form can tell the lengths without loading a validator. */
export const PASSWORD_LENGTH = { least: 8, advised: 15, most: 256 } as const;
