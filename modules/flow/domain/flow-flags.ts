/** Doubts that travel with a number. The number stands; the flag is always shown with it. */
export const FLOW_FLAGS = {
  READING_LOW_IN_RANGE: "Read low on the scale; a smaller range reads finer.",
  READING_HIGH_IN_RANGE: "Read at the top of the scale; take the next range.",
  CONVERTED_PRESSURE: "Converted from another test pressure.",
  PRESSURE_RATIO_LARGE: "Converted over more than a factor of two in pressure.",
  PRESSURE_OFF_NOMINAL: "Pressure was more than 10 % off. Read it again.",
  OUTSIDE_CIPM_RANGE: "Room outside 15 to 27 °C or 600 to 1100 hPa; density is less certain.",
  SELF_CANCELLING: "Weather cancels on this bench; no correction made.",
  TEMPERATURE_CORRECTED: "Corrected for air warmed between port and orifice.",
  LEAK_SCALED: "Leak was read at another pressure and scaled.",
  LEAK_HIGH: "Leak is over 5 % of the reading. Seal the fixture.",
  CALIBRATION_DRIFT: "Bench factor moved by more than 1 % since the last check.",
  CHECK_PLATE_OVERDUE: "A check plate was past its due date.",
  CHOKED: "Flow is choked: it is at the speed of sound.",
  CD_UNUSUAL: "Discharge coefficient outside 0.30 to 0.80. Check diameter, lift and units.",
  CD_ABOVE_ONE: "Discharge coefficient above 1 is impossible. Check diameter, lift, leak and units.",
  ABOVE_IDEAL_PORT_LIMIT: "More flow than the smallest section can pass. Check the section and the pressure.",
  SYNTHETIC_CAM: "Made from maximum lift and duration only; not a measured cam.",
  NO_REPEATS: "No repeat readings, so the gain was not judged against the noise.",
  BENCH_HISTORY: "Judged by this bench's repeat history.",
  NOT_TESTED_TO_CAM_LIFT: "No reading at or above the cam's maximum lift.",
  FLOW_AT_ZERO_LIFT: "Flow with the valve shut. Check that it seats and the indicator is zeroed.",
  LIFT_ZERO_DRIFT: "Indicator did not return to zero. Read it again.",
  FACTOR_OUTSIDE_USUAL_RANGE: "Weather factor outside 0.93 to 1.07.",
  COIL_BIND: "Coil bind: the spring is solid before full lift. Do not run.",
  COIL_BIND_CLEARANCE_LOW: "Coil-bind clearance under the minimum entered.",
  NO_SHIM_IN_RANGE: "No shim of the kit brings the clearance into range.",
  MEASURED_AT_MOST: "Measured less than the thinnest gauge: clearance is at most this.",
  VALVE_TO_PISTON_BELOW_MINIMUM: "Valve-to-piston clearance under the minimum. Do not run.",
  RETAINER_TO_SEAL_BELOW_MINIMUM: "Retainer-to-seal clearance under the minimum. Do not run.",
  CURE_TEMPERATURE_LOW: "Shop was colder than the data sheet allows during the cure.",
  CURE_TEMPERATURE_HIGH: "Shop was warmer than the data sheet allows during the cure.",
  CURE_TEMPERATURE_NOT_LOGGED: "No temperature was logged during the cure.",
  APPLIED_AFTER_POT_LIFE: "Applied after the pot life had ended.",
  FILL_SPREAD_LARGE: "Burette fills differ by more than 0.2 cc. Fill again.",
} as const;

export type FlowFlag = keyof typeof FLOW_FLAGS;

/** Doubts that belong to one lift; written `FLOW_FALLS_WITH_LIFT@8`. */
export const LIFT_FLAGS = {
  FLOW_FALLS_WITH_LIFT: "Flow falls here. Look for a stall, loose clay, coil bind or a misread range.",
  OUTLIER: "Reading does not fit its neighbours. Look for a mistyped digit.",
  GAIN_UNUSUAL: "Gain over 40 %. Check range and pressure of both tests.",
} as const;

export type LiftFlag = keyof typeof LIFT_FLAGS;
export type LiftFlagAt = `${LiftFlag}@${number}`;
