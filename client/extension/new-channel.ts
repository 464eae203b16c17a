import * as vscode from 'vscode';

/** A first channel: complete, small, without a finding. */
const FIRST_CHANNEL = `lanewright: 1
title: My first lane
line-rate: 10.3125 Gb/s

transmitter:
  swing: 600 mV
receiver:
  noise: 1 mV

path:
  - trace: run
    length: 80 mm
    impedance: 100 ohm ± 8%
    delay: 6.6 ps/mm
    loss: 0.02 dB/mm @ 5 GHz

limits:
  - insertion-loss: whole
    max: 6 dB @ nyquist
  - eye: main
    height: 60 mV
    width: 0.4 UI
`;

/** Opens an unsaved channel file; saved as `NAME.channel.yaml` it is a file like any other. */
export async function newChannel(): Promise<void> {
  const document = await vscode.workspace.openTextDocument({ language: 'lanewright-channel', content: FIRST_CHANNEL });
  await vscode.window.showTextDocument(document);
}
