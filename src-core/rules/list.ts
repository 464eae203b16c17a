import { ambiguousName } from './ambiguous-name';
import { budget } from './budget';
import { causality } from './causality';
import { configuration } from './configuration';
import { countedTwice } from './counted-twice';
import { dataRange } from './data-range';
import { droop } from './droop';
import { duplicateKey } from './duplicate-key';
import { duplicateName } from './duplicate-name';
import { eye } from './eye';
import { formatVersion } from './format-version';
import { gridLimit } from './grid-limit';
import { impedanceStep } from './impedance-step';
import { impedanceTarget } from './impedance-target';
import { implausibleQuantity } from './implausible-quantity';
import { insertionLoss } from './insertion-loss';
import { internal } from './internal';
import { layerOrder } from './layer-order';
import { limit } from './limit';
import { limitOrder } from './limit-order';
import { missingEnd } from './missing-end';
import { missingFile } from './missing-file';
import { modelRange } from './model-range';
import { passivity } from './passivity';
import { portMap } from './port-map';
import { quantity } from './quantity';
import { reciprocity } from './reciprocity';
import { refusedFile } from './refused-file';
import { reservedKey } from './reserved-key';
import { returnLoss } from './return-loss';
import { schema } from './schema';
import { signalOnPlane } from './signal-on-plane';
import { skew } from './skew';
import { stubResonance } from './stub-resonance';
import { tab } from './tab';
import { tapSum } from './tap-sum';
import { timeLimit } from './time-limit';
import { touchstone } from './touchstone';
import type { AnyRule } from './types';
import { unknownLayer } from './unknown-layer';
import { unknownName } from './unknown-name';
import { unusedKey } from './unused-key';
import { unusedPart } from './unused-part';
import { useCycle } from './use-cycle';
import { waiverDead } from './waiver-dead';
import { waiverOutdated } from './waiver-outdated';
import { waiverOutgrown } from './waiver-outgrown';
import { yaml } from './yaml';

/** Every rule, in the order of the reference. A new rule is its file and a line here. */
export const rules: readonly AnyRule[] = [
  // the text
  yaml,
  tab,
  duplicateKey,
  limit,
  formatVersion,
  // what the text says
  schema,
  quantity,
  implausibleQuantity,
  reservedKey,
  unusedKey,
  // names and files
  unknownName,
  ambiguousName,
  duplicateName,
  useCycle,
  missingFile,
  refusedFile,
  unusedPart,
  // layers
  unknownLayer,
  layerOrder,
  signalOnPlane,
  // elements
  stubResonance,
  impedanceStep,
  impedanceTarget,
  skew,
  droop,
  tapSum,
  budget,
  countedTwice,
  modelRange,
  // files of data
  touchstone,
  portMap,
  dataRange,
  passivity,
  reciprocity,
  causality,
  // limits
  limitOrder,
  missingEnd,
  insertionLoss,
  returnLoss,
  eye,
  // waivers and configuration
  waiverDead,
  waiverOutgrown,
  waiverOutdated,
  configuration,
  // the computation
  gridLimit,
  timeLimit,
  internal,
];
