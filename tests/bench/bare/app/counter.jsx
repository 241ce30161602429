'use client';

import { useState } from 'react';

/** So that the twin has one component that runs in the browser. */
export function Counter() {
  const [count, setCount] = useState(0);
  return <button onClick={() => setCount(count + 1)}>{count}</button>;
}
