import type { Raw } from '@/lib/domain/operations/fill';
import type { Operation } from '@/lib/domain/operations/operation';

interface SheetConflictProps {
  operation: Operation;
  mine: Raw;
  theirs: Raw;
  onKeepMine: () => void;
  onTakeTheirs: () => void;
}

/** Two people wrote on one sheet: both values of every box that differs, side by side, and one press for either. */
export function SheetConflict({ operation, mine, theirs, onKeepMine, onTakeTheirs }: SheetConflictProps) {
  const paths = [...new Set([...Object.keys(mine), ...Object.keys(theirs)])].filter(
    (path) => !path.startsWith('keep:') && (mine[path] ?? '') !== (theirs[path] ?? ''),
  );
  return (
    <section
      role="alert"
      aria-label="Two versions of this sheet"
      className="mb-4 border-l-4 border-past bg-past-wash px-4 py-3"
    >
      <table className="w-full max-w-2xl text-[15px]">
        <thead>
          <tr className="text-left text-[13px] text-ink-2">
            <th className="py-1 pr-3 font-medium">Box</th>
            <th className="py-1 pr-3 font-medium">Theirs, kept</th>
            <th className="py-1 font-medium">Yours, not kept</th>
          </tr>
        </thead>
        <tbody>
          {paths.map((path) => (
            <tr key={path} className="border-t border-rule-2">
              <th scope="row" className="py-1.5 pr-3 text-left font-normal">
                {nameOf(operation, path)}
              </th>
              <td className="num pr-3">{theirs[path] ?? ''}</td>
              <td className="num">{mine[path] ?? ''}</td>
            </tr>
          ))}
        </tbody>
      </table>
      <p className="mt-3 flex flex-wrap gap-2">
        <button type="button" className="btn btn-ghost" onClick={onTakeTheirs}>
          Take theirs
        </button>
        <button type="button" className="btn btn-ghost" onClick={onKeepMine}>
          Keep mine
        </button>
      </p>
    </section>
  );
}

function nameOf(operation: Operation, path: string): string {
  const [name = '', ...place] = path.split('.');
  return [operation.fields[name]?.label ?? name, ...place].join(', ');
}
