/** Entry of the server that an editor starts as a process of its own. */
import { serveParent } from './node-server.ts';

serveParent();
