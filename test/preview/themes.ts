/** The variables that the page uses, with values like those that an editor hands to a webview. */
export interface Theme {
  readonly name: string;
  readonly bodyClass: string;
  readonly variables: Readonly<Record<string, string>>;
}

const common = { 'font-family': 'system-ui, sans-serif', 'font-size': '13px', 'editor-font-family': 'monospace' };

export const themes: readonly Theme[] = [
  {
    name: 'light',
    bodyClass: 'vscode-light',
    variables: {
      ...common,
      foreground: '#3b3b3b',
      'editor-background': '#ffffff',
      descriptionForeground: '#3b3b3b',
      errorForeground: '#c72e0f',
      'editorError-foreground': '#e51400',
      'editorWarning-foreground': '#bf8803',
      'editorIndentGuide-background1': '#d3d3d3',
      'widget-border': '#e5e5e5',
      focusBorder: '#005fb8',
      'charts-blue': '#1a85ff',
      'charts-orange': '#d18616',
      'charts-green': '#388a34',
      'charts-purple': '#652d90',
      'button-secondaryBackground': '#e5e5e5',
      'button-secondaryForeground': '#3b3b3b',
      'button-secondaryHoverBackground': '#cccccc',
      'list-hoverBackground': '#f2f2f2',
      'list-inactiveSelectionBackground': '#e4e6f1',
    },
  },
  {
    name: 'dark',
    bodyClass: 'vscode-dark',
    variables: {
      ...common,
      foreground: '#cccccc',
      'editor-background': '#1f1f1f',
      descriptionForeground: '#9d9d9d',
      errorForeground: '#f85149',
      'editorError-foreground': '#f14c4c',
      'editorWarning-foreground': '#cca700',
      'editorIndentGuide-background1': '#404040',
      'widget-border': '#313131',
      focusBorder: '#0078d4',
      'charts-blue': '#3794ff',
      'charts-orange': '#d18616',
      'charts-green': '#89d185',
      'charts-purple': '#b180d7',
      'button-secondaryBackground': '#313131',
      'button-secondaryForeground': '#cccccc',
      'button-secondaryHoverBackground': '#3c3c3c',
      'list-hoverBackground': '#2a2d2e',
      'list-inactiveSelectionBackground': '#37373d',
    },
  },
  {
    name: 'high-contrast',
    bodyClass: 'vscode-high-contrast',
    variables: {
      ...common,
      foreground: '#ffffff',
      'editor-background': '#000000',
      descriptionForeground: '#ffffffb3',
      errorForeground: '#f48771',
      contrastBorder: '#6fc3df',
      focusBorder: '#f38518',
      'button-border': '#6fc3df',
      'button-secondaryForeground': '#ffffff',
    },
  },
  {
    name: 'high-contrast-light',
    bodyClass: 'vscode-high-contrast-light',
    variables: {
      ...common,
      foreground: '#292929',
      'editor-background': '#ffffff',
      descriptionForeground: '#292929',
      errorForeground: '#b5200d',
      contrastBorder: '#0f4a85',
      focusBorder: '#006bbd',
      'button-border': '#0f4a85',
      'button-secondaryBackground': '#ffffff',
      'button-secondaryForeground': '#292929',
    },
  },
];
