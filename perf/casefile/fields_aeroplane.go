package casefile

import "levelspan/perf"

// of makes a field whose range is that of an input of the model, in the file's unit.
func of(q perf.Quantity, d Dimension, unit string, scale, zero float64) Field {
	r := q.Domain()
	return Field{Name: r.Name, Dimension: d, Unit: unit, scale: scale, zero: zero, quantity: q, hasQuantity: true,
		Min: tidy((r.Min - zero) / scale), Max: tidy((r.Max - zero) / scale)}
}

// own makes a field that the model of perf does not take in.
func own(name string, d Dimension, unit string, min, max float64) Field {
	return Field{Name: name, Dimension: d, Unit: unit, scale: 1, Min: min, Max: max}
}

// words makes a text field of min to max characters.
func words(name string, min, max float64) Field {
	return Field{Name: name, Min: min, Max: max, Required: min > 0}
}

func choice(name string, byDefault string, choices ...string) Field {
	return Field{Name: name, Choices: choices, Text: byDefault, Required: byDefault == ""}
}

func (f Field) need() Field                    { f.Required = true; return f }
func (f Field) or(x float64) Field             { f.Default = x; return f }
func (f Field) typical(x float64) Field        { f.Typical = x; return f }
func (f Field) named(name string) Field        { f.Name = name; return f }
func (f Field) where(help string) Field        { f.Help = help; return f }
func (f Field) forKinds(kinds ...string) Field { f.Kinds = kinds; return f }
func (f Field) otherwise(text string) Field    { f.Otherwise = text; return f }
func (f Field) omitted() Field                 { f.omit = true; return f }

// The kinds of engine and propeller.
const (
	Piston             = "piston"
	Turboprop          = "turboprop"
	Electric           = "electric"
	PressureAltitude   = "pressure-altitude"
	DensityAltitude    = "density-altitude"
	FieldElevation     = "field"
	ConstantEfficiency = "constant-efficiency"
	ConstantSpeed      = "constant-speed"
	FixedPitch         = "fixed-pitch"
	Table              = "table"
)

var polarObject = newObject(func(p *Polar) *string { return &p.extra },
	leaf("cd0", func(p *Polar) *float64 { return &p.CD0 }, of(perf.QuantityParasiteDrag, Ratio, "", 1, 0).need().typical(0.03).
		where("Drag area (equivalent flat plate) divided by the wing area. Clean retractable 0.020 to 0.025, fixed gear 0.028 to 0.038, struts and big tyres 0.035 to 0.050 (common practice). Level and glide runs find it.")),
	leaf("oswald_e", func(p *Polar) *float64 { return &p.OswaldE }, of(perf.QuantityOswaldEfficiency, Ratio, "", 1, 0).need().typical(0.75).
		where("Oswald's efficiency of the whole aeroplane: 0.70 to 0.80 for a plain wing with fixed gear, 0.80 to 0.90 for a clean one (common practice).")),
	leaf("cl_min_drag", func(p *Polar) *float64 { return &p.CLMinDrag }, of(perf.QuantityLiftOfLeastDrag, Ratio, "", 1, 0).
		where("Lift coefficient at which the drag coefficient is least. Leave 0 unless a measured polar is at hand.")),
)

var configurationObject = newObject(func(p *Configuration) *string { return &p.extra },
	leaf("name", func(p *Configuration) *string { return &p.Name }, words("configuration name", 1, 40).
		where("Flaps and gear in a word or two: clean, take-off, landing.")),
	leaf("cl_max", func(p *Configuration) *float64 { return &p.CLMax }, of(perf.QuantityMaximumLift, Ratio, "", 1, 0).need().typical(1.45).
		where("From the stalling speed: 2 W / (rho0 S VS^2) with VS as calibrated airspeed. Plain wing 1.3 to 1.6, flaps down 1.8 to 2.3 (common practice). Stall runs find it.")),
	leaf("delta_cd0", func(p *Configuration) *float64 { return &p.DeltaCD0 }, of(perf.QuantityParasiteDragRise, Ratio, "", 1, 0).
		where("Added to cd0 with these flaps and this gear: 0 clean, 0.01 to 0.02 take-off flaps, 0.03 to 0.06 full flaps (common practice).")),
)

var consumptionObject = newObject(func(p *ConsumptionPoint) *string { return &p.extra },
	leaf("power_fraction", func(p *ConsumptionPoint) *float64 { return &p.PowerFraction }, of(perf.QuantityPowerFraction, Ratio, "", 1, 0).need().
		where("Fraction of rated power of this row; the rows rise.")),
	leaf("kg_per_kwh", func(p *ConsumptionPoint) *float64 { return &p.KgPerKWh }, of(perf.QuantitySpecificConsumption, Consumption, "kg/kWh", 1/perf.KilowattHour, 0).need().
		where("Fuel flow divided by shaft power, from the engine maker's chart.")),
)

var engineObject = newObject(func(p *Engine) *string { return &p.extra },
	leaf("kind", func(p *Engine) *string { return &p.Kind }, choice("engine kind", "", Piston, Turboprop, Electric).
		where("A piston engine with a full-throttle altitude above 0 is turbocharged.")),
	leaf("rated_power_w", func(p *Engine) *float64 { return &p.RatedPowerW }, of(perf.QuantityRatedPower, Power, "W", 1, 0).need().typical(74600).
		where("Engine plate or type certificate: full throttle at sea level on a standard day. Turboprop: the flat rating.")),
	leaf("rated_rpm", func(p *Engine) *float64 { return &p.RatedRPM }, of(perf.QuantityRatedSpeed, Revolutions, "rpm", perf.RevPerMin, 0).or(2750).
		where("Revolutions of the propeller shaft at rated power: the plate's figure divided by the gear ratio. Must be given for fixed-pitch and table propellers.")),
	leaf("maximum_rpm", func(p *Engine) **float64 { return &p.MaximumRPM }, of(perf.QuantityMaximumSpeed, Revolutions, "rpm", perf.RevPerMin, 0).otherwise("no limit known").
		where("Red line of the tachometer, at the propeller shaft.")),
	leaf("power_law", func(p *Engine) *string { return &p.PowerLaw }, choice("power law", PressureAltitude, PressureAltitude, DensityAltitude).forKinds(Piston).
		where("How full-throttle power falls with height: by pressure altitude and the square root of temperature (engine charts), or by density alone (textbooks).")),
	leaf("full_throttle_altitude_m", func(p *Engine) *float64 { return &p.FullThrottleAltitudeM }, of(perf.QuantityFullThrottleAltitude, Altitude, "m", 1, 0).forKinds(Piston).
		where("Critical altitude of a turbocharged engine, from its manual; 0 for a naturally aspirated one.")),
	leaf("drop_off_constant", func(p *Engine) *float64 { return &p.DropOffConstant }, of(perf.QuantityDropOffConstant, Ratio, "", 1, 0).or(0.12).typical(0.12).forKinds(Piston).
		where("Share of the power that goes into friction: 0.12 after Gagg and Ferrar (1934); leave it unless the engine's own chart says otherwise.")),
	leaf("lapse_exponent", func(p *Engine) *float64 { return &p.LapseExponent }, of(perf.QuantityLapseExponent, Ratio, "", 1, 0).or(0.7).typical(0.7).forKinds(Turboprop).
		where("Exponent of the density ratio by which thermal power falls with height, 0.7 to 0.8 (common practice).")),
	leaf("thermal_power_w", func(p *Engine) **float64 { return &p.ThermalPowerW }, of(perf.QuantityThermalPower, Power, "W", 1, 0).otherwise("the rated power").forKinds(Turboprop).
		where("Power that the gas generator could give at sea level, at least the flat rating; from the engine's type certificate.")),
	leaf("specific_consumption_kg_per_kwh", func(p *Engine) *float64 { return &p.SpecificConsumptionKgPerKWh }, of(perf.QuantitySpecificConsumption, Consumption, "kg/kWh", 1/perf.KilowattHour, 0).or(0.30).typical(0.30).forKinds(Piston, Turboprop).
		where("Fuel flow divided by shaft power: 0.26 to 0.33 for a piston engine leaned to cruise, 0.33 to 0.45 for a small turboprop (common practice). Engine manual, or the fuel log.")),
	list("consumption_table", func(p *Engine) *[]ConsumptionPoint { return &p.ConsumptionTable }, 0, 50,
		"Specific consumption against the fraction of rated power; where given it replaces specific_consumption_kg_per_kwh. Fractions rise.", consumptionObject).omitted(),
)

var propellerObject = newObject(func(p *Propeller) *string { return &p.extra },
	leaf("kind", func(p *Propeller) *string { return &p.Kind }, choice("propeller kind", "", ConstantEfficiency, ConstantSpeed, FixedPitch, Table).
		where("Constant efficiency is the textbook's; choose constant-speed or fixed-pitch where the propeller is known.")),
	leaf("efficiency", func(p *Propeller) *float64 { return &p.Efficiency }, of(perf.QuantityPropellerEfficiency, Ratio, "", 1, 0).need().typical(0.8).forKinds(ConstantEfficiency).
		where("Thrust power over shaft power: 0.70 to 0.75 fixed pitch in climb, 0.80 to 0.85 in cruise (common practice).")),
	leaf("diameter_m", func(p *Propeller) *float64 { return &p.DiameterM }, of(perf.QuantityDiameter, Length, "m", 1, 0).need().typical(1.8).forKinds(ConstantSpeed, FixedPitch, Table).
		where("Tip to tip; stamped on the hub or in the log book.")),
	leaf("blade_efficiency", func(p *Propeller) *float64 { return &p.BladeEfficiency }, of(perf.QuantityBladeEfficiency, Ratio, "", 1, 0).need().typical(0.87).forKinds(ConstantSpeed).
		where("What the blades keep beside the ideal actuator disc: 0.85 to 0.90 (common practice). Climb runs find it.")),
	leaf("polar_slope", func(p *Propeller) *float64 { return &p.PolarSlope }, of(perf.QuantityPolarSlope, Ratio, "", 1, 0).need().typical(1.75).forKinds(FixedPitch).
		where("m of the linear propeller polar CT/J^2 = m CP/J^2 + b; 1.6 to 2.0. From a maker's chart, or level and climb runs.")),
	leaf("polar_intercept", func(p *Propeller) *float64 { return &p.PolarIntercept }, of(perf.QuantityPolarIntercept, Ratio, "", 1, 0).need().typical(-0.055).forKinds(FixedPitch).
		where("b of the linear propeller polar CT/J^2 = m CP/J^2 + b; negative, -0.03 to -0.09.")),
	leaf("power_coefficient_static", func(p *Propeller) *float64 { return &p.PowerCoefficientStatic }, of(perf.QuantityPowerCoefficientStatic, Ratio, "", 1, 0).need().typical(0.045).forKinds(FixedPitch).
		where("CP standing still: power / (rho n^3 D^5) at full throttle static rpm, 0.03 to 0.06.")),
	leaf("power_coefficient_slope", func(p *Propeller) *float64 { return &p.PowerCoefficientSlope }, of(perf.QuantityPowerCoefficientSlope, Ratio, "", 1, 0).need().typical(-0.02).forKinds(FixedPitch).
		where("cp1 of CP = cp0 + cp1 J^2; from the full-throttle rpm static and in fast level flight.")),
	leaf("advance_ratio", func(p *Propeller) *[]float64 { return &p.AdvanceRatio }, of(perf.QuantityAdvanceRatio, Ratio, "", 1, 0).need().forKinds(Table).
		where("J = V/(n D) of each row of the maker's or a published test's table; at least 3, rising.")),
	leaf("thrust_coefficient", func(p *Propeller) *[]float64 { return &p.ThrustCoefficient }, of(perf.QuantityThrustCoefficient, Ratio, "", 1, 0).need().forKinds(Table).
		where("CT = T/(rho n^2 D^4) of each row.")),
	leaf("power_coefficient", func(p *Propeller) *[]float64 { return &p.PowerCoefficient }, of(perf.QuantityPowerCoefficient, Ratio, "", 1, 0).need().forKinds(Table).
		where("CP = P/(rho n^3 D^5) of each row.")),
)

func placard(name string) Field {
	return of(perf.QuantityPlacardSpeed, Speed, "m/s", 1, 0).named(name).otherwise("none")
}

var placardsObject = newObject(func(p *Placards) *string { return &p.extra },
	leaf("vne_cas_mps", func(p *Placards) **float64 { return &p.VNECASMps }, placard("never-exceed speed, CAS").
		where("VNE of the flight manual, red line of the airspeed indicator, as calibrated airspeed.")),
	leaf("vne_tas_mps", func(p *Placards) **float64 { return &p.VNETASMps }, placard("never-exceed speed, TAS").
		where("Where flutter sets it, the manual gives VNE as true airspeed or as a table over height; enter the true airspeed.")),
	leaf("vno_cas_mps", func(p *Placards) **float64 { return &p.VNOCASMps }, placard("normal operating speed, CAS").
		where("VNO, top of the green arc, as calibrated airspeed.")),
	leaf("va_cas_mps", func(p *Placards) **float64 { return &p.VACASMps }, placard("manoeuvring speed at maximum mass, CAS").
		where("VA of the flight manual at maximum mass; today's is scaled by the square root of the mass ratio.")),
	leaf("vfe_cas_mps", func(p *Placards) **float64 { return &p.VFECASMps }, placard("flaps extended speed, CAS").
		where("VFE, top of the white arc, as calibrated airspeed.")),
)

var calibrationPointObject = newObject(func(p *CalibrationPoint) *string { return &p.extra },
	leaf("ias_mps", func(p *CalibrationPoint) *float64 { return &p.IASMps }, of(perf.QuantityPositionErrorIAS, Speed, "m/s", 1, 0).need().
		where("Indicated airspeed of this row; the rows rise.")),
	leaf("cas_minus_ias_mps", func(p *CalibrationPoint) *float64 { return &p.CASMinusIASMps }, of(perf.QuantityPositionErrorCorrection, Correction, "m/s", 1, 0).need().
		where("Calibrated less indicated airspeed there. Flight manual's calibration table, or GPS runs.")),
)

var calibrationObject = newObject(func(p *Calibration) *string { return &p.extra },
	leaf("configuration", func(p *Calibration) *string { return &p.Configuration }, words("configuration", 1, 40).
		where("Name of the configuration that the table is for.")),
	list("points", func(p *Calibration) *[]CalibrationPoint { return &p.Points }, 1, 100,
		"Rows of rising indicated airspeed; linear in between, the end's correction beyond.", calibrationPointObject),
)

var aeroplaneObject = newObject(func(p *Aeroplane) *string { return &p.extra },
	leaf("name", func(p *Aeroplane) *string { return &p.Name }, words("name", 1, 80).where("As it should stand on the chart and the card.")),
	leaf("note", func(p *Aeroplane) *string { return &p.Note }, words("note", 0, 1000).where("Anything that tells this state of the aeroplane from others: tyres, propeller, seats.")),
	leaf("wing_area_m2", func(p *Aeroplane) *float64 { return &p.WingAreaM2 }, of(perf.QuantityWingArea, Area, "m²", 1, 0).need().
		where("Drawing or flight manual: plan area, with the part inside the fuselage.")),
	leaf("wing_span_m", func(p *Aeroplane) *float64 { return &p.WingSpanM }, of(perf.QuantityWingSpan, Length, "m", 1, 0).need().
		where("Tip to tip, from the three-view drawing or a tape.")),
	leaf("empty_mass_kg", func(p *Aeroplane) *float64 { return &p.EmptyMassKg }, of(perf.QuantityEmptyMass, Mass, "kg", 1, 0).need().
		where("Latest weighing report.")),
	leaf("maximum_mass_kg", func(p *Aeroplane) *float64 { return &p.MaximumMassKg }, of(perf.QuantityMaximumMass, Mass, "kg", 1, 0).need().
		where("Maximum take-off mass of the flight manual or permit.")),
	part("polar", func(p *Aeroplane) *Polar { return &p.Polar }, true, "Drag polar CD = cd0 + k (CL - cl_min_drag)^2 with k = 1/(pi A oswald_e).", polarObject),
	list("configurations", func(p *Aeroplane) *[]Configuration { return &p.Configurations }, 1, 20, "Settings of flaps and gear.", configurationObject),
	part("engine", func(p *Aeroplane) *Engine { return &p.Engine }, true, "Source of shaft power.", engineObject),
	part("propeller", func(p *Aeroplane) *Propeller { return &p.Propeller }, true, "What turns shaft power into thrust.", propellerObject),
	maybe("fuel", func(p *Aeroplane) **Fuel { return &p.Fuel }, "Fuel that can be used.", newObject(func(p *Fuel) *string { return &p.extra },
		leaf("usable_kg", func(p *Fuel) *float64 { return &p.UsableKg }, of(perf.QuantityUsableFuel, FuelMass, "kg", 1, 0).need().
			where("Usable fuel of the flight manual; volume times density, 0.72 kg a litre for petrol, 0.80 for kerosene (common practice).")),
		leaf("density_kg_per_l", func(p *Fuel) **float64 { return &p.DensityKgPerL }, own("fuel density", FuelDensity, "kg/L", 0.5, 1.2).omitted().
			otherwise("0.72 for a piston engine, 0.80 for a turboprop").
			where("Only for showing fuel by volume: 0.72 for petrol, 0.80 for kerosene (common practice).")),
	)),
	maybe("battery", func(p *Aeroplane) **Battery { return &p.Battery }, "Charge that can be used, for an electric aeroplane.", newObject(func(p *Battery) *string { return &p.extra },
		leaf("usable_kwh", func(p *Battery) *float64 { return &p.UsableKWh }, of(perf.QuantityUsableEnergy, Energy, "kWh", perf.KilowattHour, 0).need().
			where("Energy at the motor controller between full and the least charge allowed.")),
	)),
	part("placards", func(p *Aeroplane) *Placards { return &p.Placards }, false, "Speeds that the aeroplane's papers forbid to exceed.", placardsObject),
	list("calibration", func(p *Aeroplane) *[]Calibration { return &p.Calibration }, 0, 20, "Airspeed calibration of each configuration; CAS = IAS where there is none.", calibrationObject),
)
