/** The sync server as a process of its own, to be killed: `sync-process.ts <database> <port>`. */
import { openDatabase } from "../../server/db/client.ts";
import { startSyncServer } from "./sync-server.ts";

const [path, port] = process.argv.slice(2);
const server = await startSyncServer(openDatabase(path), { port: Number(port) });
process.stdout.write(`ready ${server.address}\n`);
