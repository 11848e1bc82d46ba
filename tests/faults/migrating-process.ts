// Opens, and so migrates, the database named first with the migrations of the folder named second.
import { openDatabase } from '../../server/src/platform/db/database';

const [path = '', migrationsFolder = ''] = process.argv.slice(2);
process.stdout.write('opening\n');
openDatabase(path, { migrationsFolder }).$client.close();
process.stdout.write('open\n');
