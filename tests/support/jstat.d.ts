/** The part of jstat that the tests check our t factor and pooled repeats against; the package brings no declarations. */
declare module "jstat" {
  export const jStat: {
    readonly studentt: { inv(p: number, dof: number): number };
    readonly normal: { inv(p: number, mean: number, std: number): number };
    pooledstdev(groups: readonly (readonly number[])[]): number;
  };
}
