'use client';

import { Broken, type BrokenProps } from '@/components/ui/broken';

export default function BrokenPage(props: BrokenProps) {
  return <Broken {...props} />;
}
