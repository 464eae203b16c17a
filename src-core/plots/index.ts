export { renderSvg } from './kit/render';
export { ledgerLines } from './ledger-lines';
export { plots } from './list';
export { type PreviewData, previewData } from './preview-data';
