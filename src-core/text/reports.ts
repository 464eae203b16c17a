import type { Report } from '../rules/types';

export type TextReport = Report & { readonly rule: string; readonly subject?: string };
