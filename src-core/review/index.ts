export { type ReviewOptions, reviewChannel } from './channel';
export { type PairedFile, pairFiles } from './pair-files';
export { defaultThresholds, reasonsOf } from './policy';
export { joinReviews, type ReviewCall, reviewOf } from './review';
export { type ReviewSettings, settingsOf } from './settings';
export * from './types';
