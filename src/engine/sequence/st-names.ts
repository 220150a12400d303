/** Keywords, elementary types, standard functions and function blocks of IEC 61131-3 (2013), from memory; in capitals. */
const RESERVED = new Set(
  `ABS ABSTRACT ACOS ACTION ADD AND ANY ARRAY ASIN AT ATAN ATAN2 BEGIN BOOL BY BYTE CASE CAL CALC CALCN CHAR CLASS CONCAT
  CONFIGURATION CONSTANT CONTINUE COS CTD CTU CTUD DATE DATE_AND_TIME DELETE DINT DIV DO DT DWORD ELSE ELSIF END END_ACTION
  END_CASE END_CLASS END_CONFIGURATION END_FOR END_FUNCTION END_FUNCTION_BLOCK END_IF END_INTERFACE END_METHOD
  END_NAMESPACE END_PROGRAM END_REPEAT END_RESOURCE END_STEP END_STRUCT END_TRANSITION END_TYPE END_VAR END_WHILE EN ENO
  EQ EXIT EXP EXPT EXTENDS FALSE FINAL FIND FOR FROM FUNCTION FUNCTION_BLOCK F_EDGE F_TRIG GE GT IF IMPLEMENTS IN INITIAL_STEP
  INSERT INT INTERFACE INTERNAL INTERVAL JMP JMPC JMPCN LD LDATE LDN LDT LE LEFT LEN LIMIT LINT LN LOG LREAL LT LTIME LTOD LWORD
  MAX METHOD MID MIN MOD MOVE MUL MUX NAMESPACE NE NEG NIL NON_RETAIN NOT NULL OF ON OR ORN OVERLAP OVERRIDE PRIORITY PRIVATE
  PROGRAM PROTECTED PT PUBLIC Q READ_ONLY READ_WRITE REAL REF REF_TO REPEAT REPLACE RESOURCE RET RETAIN RETC RETCN RETURN RIGHT
  ROL ROR RS R_EDGE R_TRIG S R SEL SHL SHR SIN SINGLE SINT SQRT SR ST STEP STN STRING STRUCT SUB SUPER TAN TASK THEN THIS TIME
  TIME_OF_DAY TO TOD TOF TON TP TRANSITION TRUE TRUNC TYPE UDINT UINT ULINT UNTIL USING USINT VAR VAR_ACCESS VAR_CONFIG
  VAR_EXTERNAL VAR_GLOBAL VAR_INPUT VAR_IN_OUT VAR_OUTPUT VAR_TEMP WCHAR WHILE WITH WORD WSTRING XOR XORN`.split(/\s+/),
);
const LONGEST = 48;

/** Letters with marks are taken apart; these have none to take off. */
const LETTERS: Readonly<Record<string, string>> = {
  ß: 'ss',
  æ: 'ae',
  Æ: 'AE',
  ø: 'o',
  Ø: 'O',
  ł: 'l',
  Ł: 'L',
  đ: 'd',
  Đ: 'D',
};

/**
 * Identifiers for a program: letters, digits and single underscores, not beginning with a digit, no reserved word,
 * and no two alike, upper and lower case being the same (IEC 61131-3, 6.1.2).
 */
export class StNames {
  readonly #taken = new Set<string>();

  /** A new identifier like `text`. */
  fresh(text: string): string {
    const plain = [...text.normalize('NFKD')]
      .map((letter) => LETTERS[letter] ?? letter)
      .join('')
      .replace(/\p{M}/gu, '')
      .replaceAll('+', '_plus')
      .replace(/[^A-Za-z0-9]+/g, '_')
      .replace(/^_+|_+$/g, '')
      .slice(0, LONGEST)
      .replace(/_+$/, '');
    const base = /^[A-Za-z]/.test(plain) && !RESERVED.has(plain.toUpperCase()) ? plain : `X_${plain}`.replace(/_$/, '');
    let name = base;
    for (let i = 2; this.#taken.has(name.toUpperCase()); i++) name = `${base}_${i}`;
    this.#taken.add(name.toUpperCase());
    return name;
  }
}

/** One line of comment that nothing in it can end or turn into a pragma. */
export function stComment(text: string): string {
  const safe = text
    .replace(/[\p{C}\p{Zl}\p{Zp}\s]+/gu, ' ')
    .replace(/[{}]/g, (brace) => (brace === '{' ? '(' : ')'))
    .replace(/([(/*])(?=[*/)])/g, '$1 ')
    .trim();
  return `(* ${safe} *)`;
}

/** Seconds as a duration literal, in whole milliseconds. */
export const stTime = (seconds: number): string => `T#${Math.max(1, Math.round(seconds * 1000))}ms`;
