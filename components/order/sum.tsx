interface Step {
  readonly rule?: boolean;
  readonly label?: string;
  readonly text?: string;
}

/** The derivation as a machinist would write it: one value a line, a rule, the answer. */
export function Sum({ steps }: { steps: readonly Step[] }) {
  if (steps.length === 0) return null;
  return (
    <table className="w-full max-w-md text-[17px]">
      <tbody>
        {steps.map((step, index) => {
          if (step.rule) return null;
          const isAnswer = steps[index - 1]?.rule === true;
          return (
            <tr key={index} className={isAnswer ? 'border-t-2 border-ink' : ''}>
              <th
                scope="row"
                className={`py-1 text-left ${isAnswer ? 'text-[20px] font-semibold' : 'font-normal'}`}
              >
                {step.label}
              </th>
              <td className={`num py-1 text-right ${isAnswer ? 'text-[23px] font-semibold' : ''}`}>
                {step.text}
              </td>
            </tr>
          );
        })}
      </tbody>
    </table>
  );
}
