export const PRINT_HELP = `Usage: spooltable print FILE [--state "V1=a,V2=0"] [OPTIONS]

One web page that any browser prints as it stands: the circuit drawing in its frame, the operating chart, notes,
findings and the part list, each sheet with title block and number, black on white. Of a circuit on several sheets each
is printed, and where a line goes on on another one, its number and zone are.

Options:
  --state VALVE=POSITION,…          draws that state, with its marks on the lines; a valve that is left out stands at
                                    rest; without it the drawing shows no state
  --paper "A3 landscape"            A4, A3, A2, A1, Letter or Tabloid, landscape or portrait (that of the circuit)
  --only drawing,chart,notes,findings,parts   what is printed (all of them)
  --pumps running|stopped           state of all pumps (running)
  --load NAME                       a load case of the circuit, by its name or id (the loads that the parts say)
  --out FILE                        write there, whole or not at all, instead of to standard output
  --help                            this text
`;

export const PARTS_HELP = `Usage: spooltable parts FILE [OPTIONS]

The part list: code, label, part, data as entered, sheets if there are several, count. Parts alike in kind and data are one entry.

Options:
  --format text|csv   how it is written (text)
  --out FILE          write there, whole or not at all, instead of to standard output
  --help              this text
`;
