import type { Player } from '@/lib/demo/cast';
import { demoId } from '@/lib/demo/cast';
import { findPreset } from '@/lib/domain/builds/presets';
import type { Made } from '@/lib/domain/builds/made';
import { createBuild } from '@/lib/services/builds';

/** A build that orders are made for. */
export interface DemoBuild {
  readonly id: string;
  readonly made: Made;
}

interface NewBuild {
  readonly works: Player;
  readonly key: string;
  readonly engine: string;
  readonly preset: string;
  readonly customerName: string;
}

/** Opens one of the demonstration's builds. */
export function openBuild({ works, key, engine, preset, customerName }: NewBuild): Promise<DemoBuild> {
  const made = findPreset(preset);
  if (!made) throw new Error(`No preset ${preset}`);
  const input = { engine, preset: made, customerName, notes: '', neededOn: null };
  return createBuild(works, demoId(`build key ${key}`), input, demoId(`build ${key}`)).then(({ id }) => ({
    id,
    made,
  }));
}
