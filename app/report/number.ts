/** A number for print: true minus sign. */
export const printed = (text: string): string => text.replace('-', '−');
