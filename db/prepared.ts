import type { PostgresCursor, PostgresPool, PostgresPoolClient, PostgresQueryResult } from 'kysely';
import type pg from 'pg';

/** Statements kept prepared on one connection at most; what comes after is parsed each time. */
const most = 100;

type Ask = <Row>(text: string, values: readonly unknown[]) => Promise<PostgresQueryResult<Row>>;

function preparingClient(client: pg.PoolClient): PostgresPoolClient {
  const names = new Map<string, string>();
  const ask: Ask = async <Row>(text: string, values: readonly unknown[]) => {
    let name = names.get(text);
    // What has no values (begin, commit) is cheap, and may not be preparable.
    if (name === undefined && values.length > 0 && names.size < most) names.set(text, (name = `s${names.size}`));
    return (await client.query({ name, text, values: [...values] })) as unknown as PostgresQueryResult<Row>;
  };
  function query<Row>(text: string, values: readonly unknown[]): Promise<PostgresQueryResult<Row>>;
  function query<Row>(cursor: PostgresCursor<Row>): PostgresCursor<Row>;
  function query<Row>(asked: string | PostgresCursor<Row>, values: readonly unknown[] = []): Promise<PostgresQueryResult<Row>> | PostgresCursor<Row> {
    if (typeof asked !== 'string') throw new TypeError('No cursors on connections that prepare their statements.');
    return ask<Row>(asked, values);
  }
  return { query, release: (destroy) => client.release(destroy) };
}

/**
 * A pool whose connections parse and plan each statement once and only run it afterwards: half the time of a small save. For pools with
 * few, fixed statements.
 */
export function preparing(pool: pg.Pool): PostgresPool {
  const clients = new WeakMap<pg.PoolClient, PostgresPoolClient>();
  return {
    async connect() {
      const client = await pool.connect();
      let kept = clients.get(client);
      if (!kept) clients.set(client, (kept = preparingClient(client)));
      return kept;
    },
    end: () => pool.end(),
  };
}
