/** Are the ports free that the product is to listen on? Node builtins only. */
import { createServer } from 'node:net';
import { StartFault } from './packages.mjs';

/** Throws StartFault where the port cannot be listened on, naming the setting that chooses another. */
export const needPort = (host, port, setting) =>
  new Promise((free, failed) => {
    const server = createServer();
    server.once('error', (error) => {
      const example = port < 1024 ? port + 4000 : port + 10;
      const way = `Choose another: ${setting}=${example} npm start\nNothing was started.`;
      if (error.code === 'EADDRINUSE')
        failed(new StartFault(`Port ${port} on ${host} is taken by another program. ${way}`));
      else if (error.code === 'EACCES')
        failed(new StartFault(`This account may not listen on port ${port} of ${host}. ${way}`));
      else if (error.code === 'EADDRNOTAVAIL' || error.code === 'ENOTFOUND')
        failed(
          new StartFault(
            `This machine has no address ${host}. Set HOST to one it has, or leave it out.\nNothing was started.`,
          ),
        );
      else failed(error);
    });
    server.listen(port, host, () => server.close(() => free(undefined)));
  });
