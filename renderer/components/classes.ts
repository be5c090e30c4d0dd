/** Class names joined; what is absent or false is left out. */
export const classes = (...names: (string | false | null | undefined)[]): string => names.filter(Boolean).join(' ');
