type Structure = 'solved' | 'pair-only';

/** What is used when neither the command line nor the board file says. */
export const STRUCTURE_DEFAULT: Structure = 'solved';

/** Whether planes and cables are solved for: the command line wins over the board file. */
export const chooseStructure = (option: Structure | undefined, inFile: Structure | undefined): Structure =>
  option ?? inFile ?? STRUCTURE_DEFAULT;
