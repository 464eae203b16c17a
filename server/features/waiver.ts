import type { WorkspaceEdit } from 'vscode-languageserver';
import { acceptanceOf, isAcceptable } from '../../src-core/rules/add-waivers';
import { resolveEdits } from '../../src-core/text/edits';
import { type Handler, located } from '../handler';
import { workspaceEdit } from './rename';

interface WaiverParams {
  readonly uri: string;
  readonly rule: string;
  readonly at: string;
  readonly upTo?: string;
  readonly until: string;
  readonly by: string;
  readonly reason: string;
}

/** The edit that accepts a finding in writing; from the finding as it is now, with the value that the user allowed. */
export const waiver: Handler<WaiverParams, WorkspaceEdit | null> =
  (services) =>
  async ({ uri, rule, at: subject, upTo, until, by, reason }, token) => {
    const at = await located(services, uri, token, undefined, 'link');
    const finding = at?.analysis.findings.find(
      (one) => one.rule === rule && one.subject === subject && isAcceptable(one, at.analysis.model.file),
    );
    if (!at || !finding) return null;
    const edits = acceptanceOf(at.analysis, finding, { until, by, reason }).map((edit) => {
      if (upTo === undefined) return edit;
      if (edit.op === 'append')
        return { ...edit, lines: edit.lines.map((line) => (line.startsWith('up-to: ') ? `up-to: ${upTo}` : line)) };
      return edit.op === 'set' && edit.key === 'up-to' ? { ...edit, text: upTo } : edit;
    });
    return workspaceEdit(services, at.root, at.analysis.parsed, resolveEdits(edits, at.analysis.parsed));
  };
