import { rosterColumns } from '@/lib/rosters/model';

/** The headings that a roster may have, for the page that asks for one. */
export function RosterColumns() {
  return (
    <div className="overflow-x-auto" tabIndex={0} role="region" aria-label="Columns of a roster">
      <table className="ledger">
        <thead>
          <tr>
            <th scope="col">Heading</th>
            <th scope="col">What it holds</th>
            <th scope="col">Also headed</th>
          </tr>
        </thead>
        <tbody>
          {rosterColumns.map((column) => (
            <tr key={column.key}>
              <th scope="row" className="px-3 text-left font-medium">{column.title}</th>
              <td>{column.says}</td>
              <td className="text-ink-soft">{column.headings.filter((heading) => heading !== column.title.toLowerCase()).slice(0, 4).join(', ')}</td>
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  );
}
