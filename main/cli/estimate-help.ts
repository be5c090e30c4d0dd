export const ESTIMATE_HELP = `
BOARD is a board file (*.board.json) or a layout in an open format (IPC-2581).
A layout does not hold what switches on the board: give that with --sources.
"quietboard nets BOARD" lists the nets and shows a sources file to start from.

Examples:
  quietboard estimate my.board.json
  quietboard estimate layout.xml --sources my.sources.json --html report.html
  quietboard estimate my.board.json --standard "FCC Part 15" --class A \\
      --distance 10 --required-margin 6
  quietboard estimate my.board.json --json - > result.json

Exit codes:
  0  every margin reaches the required one
  1  a margin falls short
  2  usage or input error (the message says where)
  3  unexpected failure
`;
