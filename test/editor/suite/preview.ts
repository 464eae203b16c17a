import * as vscode from 'vscode';
import { ok, open, until } from './harness';

const tabs = () => vscode.window.tabGroups.all.flatMap((group) => group.tabs);
const previewTab = () =>
  tabs().find(({ input }) => input instanceof vscode.TabInputWebview && input.viewType.includes('lanewright.preview'));

export function definePreviewTests(): void {
  describe('the preview', () => {
    it('opens beside the text, follows the active channel, and can be locked', async () => {
      await open('lanes/camera-sled.channel.yaml');
      await vscode.commands.executeCommand('lanewright.openPreviewToSide');
      await until('the preview', () => previewTab()?.label.includes('camera-sled'));
      ok(previewTab()?.group.viewColumn === vscode.ViewColumn.Two, 'it stands beside the text');
      await open('lanes/ejector.channel.yaml');
      await until('the other channel', () => previewTab()?.label.includes('ejector'));
      await vscode.commands.executeCommand('lanewright.togglePreviewLock');
      await until('the lock', () => previewTab()?.label.includes('Locked'));
      await vscode.window.tabGroups.close(previewTab() as vscode.Tab);
    });
  });
}
