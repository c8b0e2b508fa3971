export const title = "the doses stand above a system, volumes and uptakes behind their lines";

export async function run({ driven, shot }) {
  await driven.open("raceways/system.marl");
  await driven
    .lens(/Today: carbonate-pump \d+ mL · calcium-pump \d+ mL · by hand magnesium-part \d+ mL/)
    .waitFor();
  await driven.line(/tank upper 300 cm x 80 cm x 30 cm.*720 L/).waitFor();
  await driven.line(/cohort acropora-plugs.*\d+(\.\d+)? (dKH|meq)/).waitFor();
  await shot(driven, "lens-and-hints");
}
