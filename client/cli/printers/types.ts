import type { Analysis } from '../../../src-core/analysis';
import type { FilePath } from '../../../src-core/text/types';

/** Prints the report of `check`, file by file, so that memory stays flat. */
export interface Printer {
  file(analysis: Analysis): void;
  end(): void;
}

export interface PrinterContext {
  readonly write: (text: string) => void;
  readonly colour: boolean;
  /** A path as the person who runs the command would write it. */
  readonly shown: (file: FilePath) => string;
  readonly version: string;
  /** Errors alone are told. */
  readonly quiet: boolean;
  /** The severities that make the status 1; errors where it is left out. */
  readonly failing?: ReadonlySet<string>;
}

export type MakePrinter = (context: PrinterContext) => Printer;
