/** What the title block of a printed report says beside what the result itself knows. */
export interface ReportTitle {
  readonly project: string;
  readonly author: string;
  /** As it shall be printed; one that begins with YYYY-MM-DD also dates the file. */
  readonly dateText: string;
  /** null: not a stored run. */
  readonly runNumber: number | null;
  readonly note: string;
}

export type Paper = 'A4' | 'Letter';
