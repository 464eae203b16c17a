import { defineCommandTests } from './commands';
import { defineDiagnosticsTests } from './diagnostics';
import { defineEditingTests } from './editing';
import { revert } from './harness';
import { defineLanguageTests } from './language';
import { definePreviewTests } from './preview';
import { defineServerTests } from './server';
import { defineWorkspaceTests } from './workspace';

/** The same tests in both hosts; `host` names the few that one of them cannot have. */
export function defineSuite(): void {
  afterEach(revert);
  defineLanguageTests();
  defineDiagnosticsTests();
  defineEditingTests();
  defineCommandTests();
  defineWorkspaceTests();
  definePreviewTests();
  defineServerTests();
}
