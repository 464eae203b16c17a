import type { Analysis } from '../../../src-core/analysis';

/** Counts as they come; accepted findings count for nothing but `waived`. */
export function countFindings() {
  const counts = { files: 0, errors: 0, warnings: 0, infos: 0, hints: 0, waived: 0 };
  const key = { error: 'errors', warning: 'warnings', info: 'infos', hint: 'hints' } as const;
  return {
    add({ findings }: Analysis) {
      counts.files++;
      for (const { severity, waivedBy } of findings) counts[waivedBy ? 'waived' : key[severity]]++;
    },
    total: () => ({ ...counts }),
  };
}
