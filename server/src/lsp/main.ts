import { join } from 'node:path';
import { pathToFileURL } from 'node:url';
import { ProposedFeatures, createConnection } from 'vscode-languageserver/node';
import { serve } from './server';

// The language server as a program: `node dist/server.js --stdio`, or --node-ipc from the extension.

serve(createConnection(ProposedFeatures.all), {
  worker: join(__dirname, 'worker.js'),
  docs: pathToFileURL(join(__dirname, '..', '/')).href,
});
