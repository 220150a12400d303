export const HELP = `Usage: spooltable COMMAND [FILE] [OPTIONS]

What every combination of lever and coil positions of a hydraulic circuit does.

Commands:
  table FILE     the whole state table
  fold FILE      the same in the fewest rows found, by actuator, pump or line
  influence FILE which lever can change what, and what is independent
  ask FILE TEXT  the rows in which something holds
  explain FILE   one state, with its reasons
  moves FILE     what each move of one lever does from one state, also on the way
  trapped FILE   where pressure stays trapped, over all states; which moves vent a line
  bleed FILE     how to let it down after a stop: the shortest list of lever moves
  powerloss FILE what a loss of power does in one state
  check FILE     whether its rules hold in every combination
  print FILE     drawing, operating chart, findings and part list as sheets to print
  parts FILE     the part list
  plan FILE      whether its step plans do what they say, and what a loss of power does

Options:
  --help         this text; after a command, the help of that command
  --version      the version

FILE is a circuit saved by the editor (*.spool.json); - reads standard input.
Exit code: 0 done, 1 a check failed (bleed: pressure is left that no lever list vents; check: a
rule is broken or not decided; ask: it holds in no row; plan: a step does not do what it says; trapped --line: no
combination vents it; powerloss: something comes down or starts), 2 bad input or usage.
`;

export const TABLE_HELP = `Usage: spooltable table FILE [OPTIONS]

One row for each combination of positions: what each actuator does, what the pumps do, which lines are
blocked, where pressure stays trapped; then the findings. The first valve changes slowest.

Options:
  --format text|csv|json|markdown   how it is written (text); csv holds the rows only, without the findings
  --pumps running|stopped           state of all pumps (running); findings are always those with pumps running
  --load NAME                       a load case of the circuit, by its name or id (the loads that the parts say)
  --part NAME                       only the rows of the independent part that this actuator, pump or lever belongs to
                                    (see influence); the other levers are held at rest, which changes nothing in it
  --numbers                         also the speed of each actuator, the pressure of each pump and the flow over each
                                    relief valve, from entered and assumed values; in json everything that is known
  --units metric|us                 units of the numbers (metric)
  --out FILE                        write there, whole or not at all, instead of to standard output
  --help                            this text
`;

export const EXPLAIN_HELP = `Usage: spooltable explain FILE [--state "V1=a,V2=0"] [OPTIONS]

One state in words, with the way the oil takes, then pressures, flows over relief valves and power from entered
and assumed values.

Options:
  --state VALVE=POSITION,…          labels and position names as on the sheet; a valve that is left out stands at
                                    rest, and the answer says so; may be given more than once
  --pumps running|stopped           state of all pumps (running)
  --load NAME                       a load case of the circuit, by its name or id (the loads that the parts say)
  --units metric|us                 units of pressures, flows and power (metric)
  --format text|json                how it is written (text)
  --out FILE                        write there, whole or not at all, instead of to standard output
  --dump FILE                       also write the row as the equations see it, in JSON, for a report of a fault
  --help                            this text
`;

export const MOVES_HELP = `Usage: spooltable moves FILE [--state "V1=a,V2=0"] [OPTIONS]

Every move of one lever from one state: what starts, stops or comes down, which lines are shut in with pressure or
vented; and what happens on the way, from the crossovers that are drawn at the valve. Where a crossover is not
drawn, what happens with all ways shut and with all ways joined. Works on panels of any size.

Options:
  --state VALVE=POSITION,…          labels and position names as on the sheet; a valve that is left out stands at
                                    rest, and the answer says so; may be given more than once
  --pumps running|stopped           state of all pumps (running)
  --load NAME                       a load case of the circuit, by its name or id (the loads that the parts say)
  --units metric|us                 units of pressures (metric)
  --format text|json                how it is written (text)
  --out FILE                        write there, whole or not at all, instead of to standard output
  --help                            this text
`;

export const POWERLOSS_HELP = `Usage: spooltable powerloss FILE [--state "V1=a,V2=0"] [OPTIONS]

Power goes in one state: the coils off with the pumps running on, the coils off and the pumps stopped, the pumps
stopped alone. What comes down, holds, starts or floats, and which lines stay under pressure. Exit code 1 when
something comes down or starts by itself. The documents of the machine, the local codes and qualified people go
before this.

Options:
  --state VALVE=POSITION,…          labels and position names as on the sheet; a valve that is left out stands at
                                    rest, and the answer says so; may be given more than once
  --load NAME                       a load case of the circuit, by its name or id (the loads that the parts say)
  --format text|json                how it is written (text)
  --out FILE                        write there, whole or not at all, instead of to standard output
  --help                            this text
`;

export const TRAPPED_HELP = `Usage: spooltable trapped FILE [--line NAME [--state "V1=a,V2=0"]] [OPTIONS]

Every line that pressure stays trapped in: why, in how many rows, and a few of these rows with the moves that
lead there. With --line: the fewest lever moves that open this line to tank, from the state given; exit code 1 when
no combination of positions does.

Options:
  --line NAME               a line by its name
  --state VALVE=POSITION,…  where the levers stand before; a valve that is left out stands at rest
  --pumps running|stopped           state of all pumps (running)
  --load NAME                       a load case of the circuit, by its name or id (the loads that the parts say)
  --format text|json                how it is written (text)
  --out FILE                        write there, whole or not at all, instead of to standard output
  --help                            this text
`;

export const BLEED_HELP = `Usage: spooltable bleed FILE [--state "V1=a,V2=0"] [OPTIONS]

The pumps stop in one state: which lines still hold pressure, and the shortest list of lever moves that lets
every one of them down to tank, with what to be cautious of before each move. Exit code 1 when pressure is left
that no list of lever moves lets down. The documents of the machine, the local codes and qualified people go
before this list.

Options:
  --state VALVE=POSITION,…          labels and position names as on the sheet; a valve that is left out stands at
                                    rest, and the answer says so; may be given more than once
  --load NAME                       a load case of the circuit, by its name or id (the loads that the parts say)
  --format text|json|html           how it is written (text); html is a sheet to print and fill in
  --out FILE                        write there, whole or not at all, instead of to standard output
  --help                            this text
`;

export const CHECK_HELP = `Usage: spooltable check FILE [--rule "never C1 moves while C2 moves" …] [OPTIONS]

Checks the rules of the circuit, then those given here, against every combination. What breaks a rule is told in
few words: this is the interlock that the panel needs. Exit code 1 when a rule is broken, or not decided because
a verdict rests on pressure; 2 when a rule cannot be read.

Options:
  --rule TEXT               one more rule; may be given more than once
  --pumps running|stopped   state of all pumps (running)
  --load NAME               a load case of the circuit, by its name or id (the loads that the parts say)
  --format text|json        how it is written (text)
  --out FILE                write there, whole or not at all, instead of to standard output
  --help                    this text

Rules:
  never A       never A when B        never A unless B        A only if B
  always A      always A when B       always A unless B       A whenever B
A and B are statements, joined by and, or, not and parentheses:
  V1 at raise      V1 at raise/lower      V1 rests      every lever rests      Y1 on      Y2 off
  C1 extends       C1 moves in            C1 moves      C1 is held             no cylinder moves
  P1 is unloaded   line supply is fed     line supply is trapped     any line is blocked under pressure
  pressure at V1.A over 160 bar           pressure at any pump at most 2900 psi
  C1 faster than 120 mm/s                 C1 moves out slower than 4 in/s
Names are those on the sheet; one that reads like words of a rule stands in double quotes.
`;

export const PLAN_HELP = `Usage: spooltable plan FILE [--plan NAME] [OPTIONS]

Plays the step plans of the circuit, event by event: what moves in each step against what is asked, the time and
energy it takes, and what ends it. Then, in the middle and at the end of each step, the power is lost: what holds,
what comes down, which lines stay under pressure, and whether the plan can go on from there. Exit code 1 when a
plan does not do what it says.

Options:
  --plan NAME               a plan by its name or id (all of them)
  --coils                   instead of the check: when each coil has to be on, which steps look alike to the sensors,
                            signal groups and the interlocks that the rules call for
  --st                      instead: all that as structured text (IEC 61131-3), a draft that a qualified person reviews
  --diagram step|time       instead: the displacement-step or displacement-time diagram as SVG, black on white
  --line NAME               a line whose pressure the diagram shows; may be given more than once (lines at pumps and
                            actuators)
  --load NAME               a load case of the circuit, by its name or id (what the plan says)
  --units metric|us         units of the figures (metric)
  --format text|json        how it is written (text); json is in SI and has every event
  --out FILE                write there, whole or not at all, instead of to standard output
  --help                    this text
`;

export const FOLD_HELP = `Usage: spooltable fold FILE [--by NAME …] [OPTIONS]

The table in the fewest rows found that say the same: "any" stands for a lever that does not matter, a/0 for
positions that may be either, and the last row for every combination that the others leave. Each fold is set
against the whole table and equal to it. Rows of one outcome may share combinations. Without --by: every actuator,
every pump, and actuators that share valves together. Panels too large to list are folded from open paths alone.

Options:
  --by NAME                 an actuator, pump or line; may be given more than once
  --pumps running|stopped   state of all pumps (running)
  --load NAME               a load case of the circuit, by its name or id (the loads that the parts say)
  --format text|json        how it is written (text)
  --out FILE                write there, whole or not at all, instead of to standard output
  --help                    this text
`;

export const INFLUENCE_HELP = `Usage: spooltable influence FILE [OPTIONS]

Which lever can change which outcome at all (x), which positions change nothing, and which parts of the circuit are
independent, with the product of their combinations. What one pump or accumulator can feed counts as one part.

Options:
  --pumps running|stopped   state of all pumps (running)
  --load NAME               a load case of the circuit, by its name or id (the loads that the parts say)
  --format text|json        how it is written (text)
  --out FILE                write there, whole or not at all, instead of to standard output
  --help                    this text
`;

export const ASK_HELP = `Usage: spooltable ask FILE "CONDITION" [OPTIONS]

Counts and lists the rows in which a condition holds, such as "LIFT moves and not PUMP unloaded" or "pressure at
V1.A over 160 bar". It is written as in rules, without "never" and "always"; see check --help and the readme. Exit
code 0 when it holds in some row, 1 when it surely holds in none, 2 when it cannot be read.

Options:
  --limit N                 rows that are listed at most (20); 0 only counts
  --pumps running|stopped   state of all pumps (running)
  --load NAME               a load case of the circuit, by its name or id (the loads that the parts say)
  --format text|json        how it is written (text)
  --out FILE                write there, whole or not at all, instead of to standard output
  --help                    this text
`;
