/** A name as the start of a file dialog: no folders, none of the signs that some system forbids. */
export const fileNameOf = (name: string): string => name.replace(/[/\\:*?"<>|\p{Cc}]/gu, '-');
