import type { Twin } from './twin';

/** A chart for those who do not see it. Seen by nobody, read by screen readers; the batch page also shows the table. */
export function TextTwin({ twin, withTable = false }: { twin: Twin; withTable?: boolean }) {
  return (
    <div className="heard-only">
      <p>{twin.sentence}</p>
      {withTable && <TwinTable twin={twin} />}
    </div>
  );
}

export function TwinTable({ twin, className = '' }: { twin: Twin; className?: string }) {
  return (
    <table className={className}>
      <caption className="heard-only">{twin.sentence}</caption>
      <thead>
        <tr>
          {twin.head.map((word) => (
            <th key={word} scope="col">
              {word}
            </th>
          ))}
        </tr>
      </thead>
      <tbody>
        {twin.rows.map((row) => (
          <tr key={row[0]}>
            {row.map((cell, index) => (index === 0 ? <th key={index} scope="row">{cell}</th> : <td key={index}>{cell}</td>))}
          </tr>
        ))}
      </tbody>
    </table>
  );
}
