/** A farm of two files that says everything the language can say, and has nothing wrong with it. */
export const eastHall = `# East hall: raceways under the skylights
use "shelves.marl"
use "west.marl"

system east-hall "East hall raceways"
  tank trough 310 cm x 80 cm x 28 cm times 3   # concrete
  tank quarantine round 1.2 m x 60 cm
  tank settler cone 70 cm x 90 cm
  tank sump 280 L
  displace racks 38 L
  displace rubble 60 kg at 2.4 kg/L until 2026-11-01
  measured volume 1910 L ± 35 L from 2026-09-14

  hold alkalinity 7.8 to 8.6 dKH aim 8.2
  hold calcium 1050 to 1100 mg/L as CaCO3
  hold magnesium 1280 to 1350 mg/L
  hold strontium 7 to 9 ppm
  hold salinity 34 to 36
  hold temperature 24.5 to 26.5 °C
  hold pH 7.9 to 8.3 total
  limit alkalinity rise 0.5 dKH/day
  limit calcium fall 15 mg/L/day
  limit pH swing 0.4
  limit alkalinity dose 0.3 dKH
  limit alkalinity max 10.5 dKH
  limit calcium min 380 mg/L

  cohort staghorn-tips 360 pieces uptake 0.8 meq/day each magnesium 4 % grows 1.5 %/week from 2026-09-20
  cohort plating 0.6 m² uptake 210 mmol/m²/day as CaCO3
  uptake strontium 0.1 mg/L/day
  skeleton magnesium 3.5 %
  air CO2 560 ppm
  light between 08:30 and 18:30
  evaporates 11 L/day
  top-off lime 150 L
  flows-through 90 L/day with vat-water from 2026-10-01 06:00
  feeds 16 g/day protein 48 %
  note "Lid of trough 2 is cracked; # 3 is on order."

  pump line-1 gives soda at 31.5 mL/min least 0.8 mL between 20:00 and 08:00 holding 10 L
  pump line-2 gives chloride at 31.5 mL/min always 40 mL/day
  by-hand epsom times 2

log east-hall
  2026-10-24 07:50 read alkalinity 8.1 dKH, calcium 418 mg/L ± 6 mg/L, salinity 35.1 with titrator by ina
  2026-10-24 08:00 read nitrate below 2 mg/L, temperature 25.2 degC disregard "wrong vial"
  2026-10-24 08:30 set line-1 280 mL/day, epsom 40 mL/day by ina
  2026-10-25 10:00 gave epsom 120 mL, soda 30 mL
  2026-10-26 11:00 renewed 150 L with vat-water
  2026-10-26 topped 12 L with lime
  2026-10-27 stocked staghorn-tips 40 pieces
  2026-10-27 removed plating 0.1 m2 by ina
  2026-10-28 moved staghorn-tips 25 pieces to west-hall
  2026-10-28 09:00 filled line-1 to 10 L
  2026-10-29 09:00 level line-1 7.4 L
  2026-10-29T09:20 calibrated line-1 62.5 mL in 2 min
  2026-10-30 21:00 stopped line-1
  2026-10-31 6:45 started line-1 by ina
  2026-10-31 note "Heater replaced."
`;

export const shelves = `reagent soda-drum "Soda ash, 20 kg drum"
  is sodium-carbonate purity 99.5 %
  reorder-below 4 kg
  lead 9 days

reagent strontium-jar
  formula SrCl2.6H2O purity 98 %

solution soda "Soda stock"
  dissolve soda-drum 385 g
  make up to 4 L
  keep at 16 degC

solution soda from 2026-10-05
  dissolve soda-drum 350 g
  make up to 4 L

solution lime
  saturated calcium-hydroxide
  acknowledge caustic "two trained staff, goggles and gloves"

solution bought
  supplies alkalinity 1.6 meq/mL as bicarbonate
  supplies calcium 72 g/L

saltwater vat-water "Vat"
  salinity 35
  alkalinity 8.4 dKH
  pH 8.0 total
  2026-10-20 read alkalinity 8.3 dKH, salinity 34.9

kit titrator "Bench titrator"
  alkalinity scatter 0.12 dKH
  pH tolerance 0.05
  2026-10-11 checked alkalinity 8.3 dKH against 8.0 dKH lot "C7" by ina

store
  2026-10-02 received soda-drum 20 kg lot "K-31" by ina
  2026-10-20 16:00 counted soda-drum 13.5 kg
  2026-10-21 09:15 mixed soda 4 L by ina
  2026-10-23 discarded soda 0.5 L
`;
