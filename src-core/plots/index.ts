export { cell, csvOf } from './kit/csv';
export { nearestValues } from './kit/read';
export { renderSvg } from './kit/render';
export { tableOf } from './kit/table';
export { ledgerLines } from './ledger-lines';
export { plots } from './list';
export { type PreviewData, previewData } from './preview-data';
