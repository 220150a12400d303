export const HELP = `Usage: spooltable COMMAND [FILE] [OPTIONS]

What every combination of lever and coil positions of a hydraulic circuit does.

Commands:
  table FILE     the whole state table
  explain FILE   one state, with its reasons

Options:
  --help         this text; after a command, the help of that command
  --version      the version

FILE is a circuit saved by the editor (*.spool.json); - reads standard input.
Exit code: 0 done, 1 a check failed (no command so far checks anything), 2 bad input or usage.
`;

export const TABLE_HELP = `Usage: spooltable table FILE [OPTIONS]

One row for each combination of positions: what each actuator does, what the pumps do, which lines are
blocked, where pressure stays trapped; then the findings. The first valve changes slowest.

Options:
  --format text|csv|json|markdown   how it is written (text); csv holds the rows only, without the findings
  --pumps running|stopped           state of all pumps (running); findings are always those with pumps running
  --out FILE                        write there, whole or not at all, instead of to standard output
  --help                            this text
`;

export const EXPLAIN_HELP = `Usage: spooltable explain FILE [--state "V1=a,V2=0"] [OPTIONS]

One state in words, with the way the oil takes.

Options:
  --state VALVE=POSITION,…          labels and position names as on the sheet; a valve that is left out stands at
                                    rest, and the answer says so; may be given more than once
  --pumps running|stopped           state of all pumps (running)
  --format text|json                how it is written (text)
  --out FILE                        write there, whole or not at all, instead of to standard output
  --help                            this text
`;
