export type Scatter =
  | { readonly kind: "normal"; readonly sigma: number }
  | { readonly kind: "lognormal"; readonly factor: number }
  | { readonly kind: "flat"; readonly low: number; readonly high: number }
  | { readonly kind: "exponential"; readonly mean: number }
  | {
      readonly kind: "mixture";
      readonly parts: readonly {
        readonly share: number;
        readonly value: number;
        readonly scatter?: Scatter | undefined;
      }[];
    };
