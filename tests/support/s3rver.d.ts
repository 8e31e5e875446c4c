declare module 's3rver' {
  interface Options {
    port: number;
    address: string;
    silent: boolean;
    directory: string;
    configureBuckets: { name: string; configs: string[] }[];
  }

  /** A fake of S3 over a folder. */
  export default class S3rver {
    constructor(options: Options);
    run(): Promise<{ address: string; port: number }>;
    close(): Promise<void>;
  }
}
