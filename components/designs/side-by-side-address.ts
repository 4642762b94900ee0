/** Where design revisions of a plant stand side by side. */
export const sideBySideAddress = (plantId: string, designRevisionIds: readonly string[]): string =>
  `/plants/${plantId}/side-by-side?designs=${designRevisionIds.join(",")}`;
