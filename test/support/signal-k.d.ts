declare module '@signalk/signalk-schema' {
  export function validateFull(tree: unknown): {
    readonly valid: boolean;
    readonly errors: readonly { readonly message: string; readonly dataPath: string }[];
    readonly missing: readonly string[];
  };
}
