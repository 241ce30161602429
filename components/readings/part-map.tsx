import { BlockMap } from '@/components/parts-map/block-map';
import { CrankMap, type FeatureState } from '@/components/parts-map/crank-map';
import type { Made } from '@/lib/domain/builds/made';
import { operationByKey } from '@/lib/domain/operations/catalogue';
import type { SizeFact } from '@/lib/domain/orders/facts';
import type { Length } from '@/lib/domain/quantity/length';
import { judge } from '@/lib/domain/readings/judge';

interface PartMapProps {
  made: Made;
  operation: string;
  sizes: readonly SizeFact[];
  readings: readonly { readonly feature: string; readonly size: Length }[];
}

const STATES = { unread: 'none', in_size: 'in_size', to_cut: 'to_cut', past: 'past' } as const;

/** The part with the state of every feature that has been read. */
export function PartMap({ made, operation, sizes, readings }: PartMapProps) {
  const { part } = operationByKey(operation);
  if (part === 'any') return null;
  const states: Record<string, FeatureState> = {};
  for (const size of sizes) {
    const own = readings.filter((reading) => reading.feature === size.feature).map((reading) => reading.size);
    states[size.feature] = STATES[judge(own, size).state];
  }
  if (part === 'block') return <BlockMap made={made} states={states} />;
  const about = operation === 'grind_rods' ? 'rods' : operation === 'grind_mains' ? 'mains' : 'both';
  return <CrankMap made={made} states={states} about={about} />;
}
