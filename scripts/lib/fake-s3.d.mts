export interface FakeS3 {
  /** S3_ENDPOINT and the rest, as the product reads them. */
  env: Record<
    'S3_ENDPOINT' | 'S3_BUCKET' | 'S3_REGION' | 'S3_ACCESS_KEY_ID' | 'S3_SECRET_ACCESS_KEY',
    string
  >
  close(): Promise<void>
}
/** An object store on loopback that keeps its objects in `folder`. */
export function startFakeS3(options: { folder: string; port?: number }): Promise<FakeS3>
