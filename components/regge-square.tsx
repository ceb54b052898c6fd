/**
 * The 3×3 square of a 3j symbol with its equal sums set beside and under it. Permuting rows or columns, or exchanging
 * them, gives the 72 symmetry-related symbols.
 */
export function ReggeSquare({ square, sum }: { square: readonly (readonly number[])[]; sum: number }) {
  return (
    <figure className="inline-block">
      <table className="tabular border-collapse text-center font-work text-lg">
        <caption className="sr-only">
          The square of the symbol. Each of its three rows and three columns sums to {sum}.
        </caption>
        <tbody>
          {square.map((row, i) => (
            <tr key={i}>
              {row.map((entry, k) => (
                <td key={k} className="size-12 border border-edge bg-sheet">
                  {entry}
                </td>
              ))}
              <td className="pl-3 text-sm text-quiet">
                <span aria-hidden="true">= </span>
                <span className="sr-only">row sum </span>
                {row.reduce((a, b) => a + b, 0)}
              </td>
            </tr>
          ))}
          <tr>
            {[0, 1, 2].map((k) => (
              <td key={k} className="pt-1.5 text-sm text-quiet">
                <span className="sr-only">column sum </span>
                {square.reduce((total, row) => total + (row[k] ?? 0), 0)}
              </td>
            ))}
            <td />
          </tr>
        </tbody>
      </table>
      <figcaption className="mt-1.5 font-ui text-xs text-quiet">
        Every row and column sums to {sum} = j₁ + j₂ + j₃.
      </figcaption>
    </figure>
  );
}
