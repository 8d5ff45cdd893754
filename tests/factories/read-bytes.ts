import type { Agent } from './test-app.ts';

/** The answer's bytes as they are. */
export function readBytes(agent: Agent, path: string): Promise<Buffer> {
  return new Promise((resolve, reject) => {
    agent
      .get(path)
      .expect(200)
      .buffer(true)
      .parse((res, done) => {
        const parts: Buffer[] = [];
        res.on('data', (part: Buffer) => parts.push(part));
        res.on('end', () => done(null, Buffer.concat(parts)));
      })
      .end((error, res) => (error ? reject(error) : resolve(res.body as Buffer)));
  });
}
