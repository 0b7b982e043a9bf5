// Exits 1 with the list of mistakes when the environment cannot be used; prints nothing otherwise.
import { ConfigError, loadConfig } from '@/server/config';

try {
  loadConfig();
} catch (error) {
  console.error(error instanceof ConfigError ? error.message : error);
  process.exitCode = 1;
}
