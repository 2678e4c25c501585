import net, { type AddressInfo } from 'node:net';

/** What the network between tablet and server does: passes everything, or swallows what the server answers. */
export interface CuttingProxy {
  url: string;
  /** What became of the reply to the request that was cut, as bytes that the tablet never saw. */
  swallowed(): string;
  close(): Promise<void>;
}

/**
 * A TCP proxy that carries the request whole and cuts the connection at the first byte of the answer (fault 6): the server
 * has committed, the tablet knows nothing.
 */
export const cuttingProxy = async (port: number): Promise<CuttingProxy> => {
  let reply = '';
  const upstreams = new Set<net.Socket>();
  const server = net.createServer((tablet) => {
    const upstream = net.connect(port, '127.0.0.1');
    upstreams.add(upstream);
    tablet.on('error', () => undefined);
    upstream.on('error', () => undefined);
    tablet.pipe(upstream);
    upstream.on('data', (bytes) => {
      reply += bytes.toString('utf8');
      tablet.destroy();
    });
  });
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
  const address = server.address() as AddressInfo;
  return {
    url: `http://127.0.0.1:${address.port}`,
    swallowed: () => reply,
    close: () => {
      for (const upstream of upstreams) upstream.destroy();
      return new Promise((resolve) => server.close(() => resolve()));
    },
  };
};
