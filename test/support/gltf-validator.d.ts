/** What the tests use of the Khronos glTF validator, which comes without types. Shape: its validation.schema.json. */
declare module 'gltf-validator' {
  export interface Message {
    readonly code: string;
    readonly message: string;
    /** 0 error, 1 warning, 2 information, 3 hint. */
    readonly severity: 0 | 1 | 2 | 3;
    readonly pointer?: string;
    /** Byte in a GLB, where there is no pointer. */
    readonly offset?: number;
  }

  export interface Report {
    readonly issues: {
      readonly numErrors: number;
      readonly numWarnings: number;
      readonly numInfos: number;
      readonly numHints: number;
      readonly messages: readonly Message[];
    };
  }

  export interface Options {
    readonly uri?: string;
    /** 0: no limit. */
    readonly maxIssues?: number;
    readonly externalResourceFunction?: (uri: string) => Promise<Uint8Array>;
  }

  export function validateBytes(data: Uint8Array, options?: Options): Promise<Report>;
}
