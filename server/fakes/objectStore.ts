import type { AddressInfo } from 'node:net';
import S3rver from 's3rver';
import type { Config, ObjectStoreConfig } from '../config';
import { refuseInProduction } from './refuseInProduction';

/** An S3 store on loopback that keeps its objects in a folder. */
export async function startObjectStore(options: {
  env: Config['env'];
  directory: string;
  bucket: string;
}): Promise<{ config: ObjectStoreConfig; stop(): Promise<void> }> {
  refuseInProduction(options.env, 'The local object store');
  const store = new S3rver({
    port: 0,
    address: '127.0.0.1',
    silent: true,
    directory: options.directory,
    configureBuckets: [{ name: options.bucket, configs: [] }],
  });
  const { port } = (await store.run()) as AddressInfo;
  return {
    config: {
      endpoint: `http://127.0.0.1:${port}`,
      region: 'us-east-1',
      bucket: options.bucket,
      accessKeyId: 'S3RVER', // the only pair that this store knows
      secretAccessKey: 'S3RVER',
      forcePathStyle: true,
    },
    stop: () => store.close(),
  };
}
