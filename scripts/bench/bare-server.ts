import type { AddressInfo } from 'node:net';
import express from 'express';
import pg from 'pg';
import { v7 as uuidv7 } from 'uuid';
import type { BareCalls } from './load';

// Express and pg alone, running the statements that it is given: what a request would cost without a house.

interface Given {
  readonly databaseUrl: string;
  readonly calls: BareCalls;
}

const { databaseUrl, calls } = JSON.parse(process.env['BENCH'] ?? '{}') as Given;
const pool = new pg.Pool({ connectionString: databaseUrl, max: 10 });
const app = express();
app.use(express.json());

for (const [name, { statements, freshId }] of Object.entries(calls)) {
  app.all(`/${name}`, async (_request, response) => {
    const id = uuidv7();
    const client = await pool.connect();
    try {
      let items: unknown[] = [];
      for (const [index, { text, values }] of statements.entries()) {
        const own = values.map((value) => (freshId && value === freshId ? id : value));
        const { rows } = await client.query({ name: `${name}-${index}`, text, values: own });
        if (rows.length > 0) items = rows;
      }
      response.json({ items });
    } finally {
      client.release();
    }
  });
}

const server = app.listen(0, '127.0.0.1', () => {
  process.send?.((server.address() as AddressInfo).port);
});
process.on('disconnect', () => process.exit());
