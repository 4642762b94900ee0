/** On a tablet, where the three columns stand below each other, a part that is a narrow column elsewhere fills the width with two. */
export const TWO_COLUMNS =
  "md:max-xl:block md:max-xl:columns-2 md:max-xl:gap-8 md:max-xl:[&>*]:mb-6 md:max-xl:[&>*]:break-inside-avoid";
