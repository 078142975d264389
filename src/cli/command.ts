/** What a command is: its words on the command line, and the function behind them. */

export interface OptionSpec {
  /** name of its value in the help ("FILE"); null for a switch */
  readonly value: string | null;
  /** one line of help */
  readonly help: string;
}

export interface CommandSpec {
  readonly name: string;
  /** after the program's name: "inspect SCAN [--recipe R] [--json]" */
  readonly usage: string;
  /** one line, for the list of commands */
  readonly summary: string;
  /** a few lines more, for the command's own help */
  readonly details: readonly string[];
  readonly options: Readonly<Record<string, OptionSpec>>;
  readonly operands: {
    /** "a scan", for messages */
    readonly noun: string;
    readonly least: number;
    readonly most: number;
  };
}

/** The words of one call, checked against the command's spec. */
export interface Call {
  readonly spec: CommandSpec;
  readonly operands: readonly string[];
  /** value of each option given; a switch that was given has "" */
  readonly options: ReadonlyMap<string, string>;
}

/** What a command may do to the outside besides reading and writing files. */
export interface Context {
  /** a line, or several, on standard output */
  readonly print: (text: string) => void;
  /** a line on standard error */
  readonly say: (text: string) => void;
  /** writes over its own line on standard error; null where that is no terminal */
  readonly progressLine: ((text: string) => void) | null;
  /** aborted when the user stops the program */
  readonly signal: AbortSignal;
}

/** @returns the exit code */
export type RunCommand = (call: Call, context: Context) => Promise<number>;
