import { createServer, type Server } from 'node:net';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { freePort, portFromEnvironment } from '../../scripts/support/ports.mjs';

describe('ports', () => {
  let taken: Server;
  let port: number;
  beforeEach(async () => {
    port = await freePort();
    taken = createServer();
    await new Promise<void>((resolve) => taken.listen(port, '127.0.0.1', resolve));
  });
  afterEach(() => {
    taken.close();
    delete process.env.TEST_PORT;
  });

  // Linux, ip_local_port_range: outgoing connections take ports from 32768 on.
  it('picks below the ports of outgoing connections', () => {
    expect(port).toBeGreaterThanOrEqual(20_000);
    expect(port).toBeLessThan(32_768);
  });

  it('says that a port is taken and which variable changes it', async () => {
    process.env.TEST_PORT = String(port);
    const sentence = `Port ${port} is taken by another program. Set TEST_PORT to a free one.`;
    await expect(portFromEnvironment('TEST_PORT', 8080)).rejects.toThrow(sentence);
  });

  it('uses the other port when the variable is absent', async () => {
    taken.close();
    expect(await portFromEnvironment('TEST_PORT', port)).toBe(port);
  });

  it.each(['0', '65536', '80.5', 'abc', '-1'])('refuses %s', async (text) => {
    process.env.TEST_PORT = text;
    await expect(portFromEnvironment('TEST_PORT', 8080)).rejects.toThrow(`from 1 to 65535, not “${text}”`);
  });
});
