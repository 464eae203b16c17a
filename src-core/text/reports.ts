import type { Report } from '../report';

export type TextReport = Report & { readonly rule: string; readonly subject?: string };
