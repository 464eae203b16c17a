import { type Host, startPage } from './app';

declare function acquireVsCodeApi(): Host;

/** The webview's entry: the host's interface may be fetched once only. */
const main = document.getElementById('preview');
if (main) startPage(acquireVsCodeApi(), main);
