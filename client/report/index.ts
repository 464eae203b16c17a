export { reportHtml } from './html';
export { reportMarkdown } from './markdown';
export { reportSvg } from './svg';

export interface ReportOptions {
  /** Of the program, for the last line. */
  readonly version?: string;
}
