package perf

import "math"

// The most rows of a list that the model takes.
const (
	maximumRows           = 200
	maximumConfigurations = 50
	// leastStaticThrust is the least thrust coefficient of a table's first row; real ones are hundreds of times greater.
	leastStaticThrust = 1e-4
)

// Validate reports every fault of the aeroplane as joined *DomainError, or nil. Faults takes them apart.
func (a *Aeroplane) Validate() error {
	var f faults
	var g propellerTable
	a.validate(&f, &g)
	return f.err()
}

func (a *Aeroplane) validate(f *faults, g *propellerTable) {
	f.check("WingArea", QuantityWingArea, a.WingArea)
	f.check("WingSpan", QuantityWingSpan, a.WingSpan)
	f.check("EmptyMass", QuantityEmptyMass, a.EmptyMass)
	f.check("MaximumMass", QuantityMaximumMass, a.MaximumMass)
	if a.MaximumMass < a.EmptyMass {
		f.add("MaximumMass", QuantityMaximumMass, a.MaximumMass, a.EmptyMass, QuantityMaximumMass.Domain().Max, "the maximum mass is below the empty mass")
	}
	f.check("Polar.ParasiteDrag", QuantityParasiteDrag, a.Polar.ParasiteDrag)
	f.check("Polar.OswaldEfficiency", QuantityOswaldEfficiency, a.Polar.OswaldEfficiency)
	f.check("Polar.LiftOfLeastDrag", QuantityLiftOfLeastDrag, a.Polar.LiftOfLeastDrag)
	if n := len(a.Configurations); n == 0 || n > maximumConfigurations {
		f.add("Configurations", QuantityMaximumLift, float64(n), 1, maximumConfigurations, "how many configurations there are")
	} else {
		for i := range a.Configurations {
			a.validateConfiguration(f, i)
		}
	}
	a.Engine.validate(f, a.Propeller.Kind)
	a.Propeller.validate(f, g)
	f.check("UsableFuel", QuantityUsableFuel, a.UsableFuel)
	f.check("UsableEnergy", QuantityUsableEnergy, a.UsableEnergy)
	p := &a.Placards
	f.optional("Placards.NeverExceedCAS", QuantityPlacardSpeed, float64(p.NeverExceedCAS))
	f.optional("Placards.NeverExceedTAS", QuantityPlacardSpeed, float64(p.NeverExceedTAS))
	f.optional("Placards.NormalOperatingCAS", QuantityPlacardSpeed, float64(p.NormalOperatingCAS))
	f.optional("Placards.ManoeuvringCAS", QuantityPlacardSpeed, float64(p.ManoeuvringCAS))
	f.optional("Placards.FlapsExtendedCAS", QuantityPlacardSpeed, float64(p.FlapsExtendedCAS))
}

func (a *Aeroplane) validateConfiguration(f *faults, i int) {
	const list = "Configurations"
	c := &a.Configurations[i]
	f.row(list, i, "MaximumLift", QuantityMaximumLift, c.MaximumLift)
	f.row(list, i, "ParasiteDragRise", QuantityParasiteDragRise, c.ParasiteDragRise)
	if c.MaximumLift <= a.Polar.LiftOfLeastDrag {
		f.add(rowKey(list, i, "MaximumLift"), QuantityMaximumLift, c.MaximumLift, a.Polar.LiftOfLeastDrag, QuantityMaximumLift.Domain().Max,
			"it must be above the lift coefficient of least drag")
	}
	if least := QuantityParasiteDrag.Domain().Min; a.Polar.ParasiteDrag+c.ParasiteDragRise < least {
		f.add(rowKey(list, i, "ParasiteDragRise"), QuantityParasiteDragRise, c.ParasiteDragRise, least-a.Polar.ParasiteDrag, QuantityParasiteDragRise.Domain().Max,
			"the whole parasite drag coefficient would be too small")
	}
	p := c.PositionError
	if len(p) > maximumRows {
		f.add(rowKey(list, i, "PositionError"), QuantityPositionErrorIAS, float64(len(p)), 0, maximumRows, "how many points there are")
		return
	}
	for j := range p {
		x, y := float64(p[j].IAS), p[j].Correction
		okX, okY := QuantityPositionErrorIAS.Domain().Holds(x), QuantityPositionErrorCorrection.Domain().Holds(y)
		if okX && okY && (j == 0 || p[j].IAS > p[j-1].IAS && p[j].cas() > p[j-1].cas()) && p[j].cas() > 0 {
			continue
		}
		f.row(rowKey(list, i, "PositionError"), j, "IAS", QuantityPositionErrorIAS, x)
		f.row(rowKey(list, i, "PositionError"), j, "Correction", QuantityPositionErrorCorrection, y)
		switch {
		case !okX || !okY:
		case !(p[j].cas() > 0):
			f.add(rowKey(rowKey(list, i, "PositionError"), j, "Correction"), QuantityPositionErrorCorrection, y, -x, QuantityPositionErrorCorrection.Domain().Max,
				"the calibrated airspeed would not be positive")
		case !(p[j].IAS > p[j-1].IAS):
			f.add(rowKey(rowKey(list, i, "PositionError"), j, "IAS"), QuantityPositionErrorIAS, x, float64(p[j-1].IAS), QuantityPositionErrorIAS.Domain().Max,
				"the indicated airspeeds must rise")
		default:
			f.add(rowKey(rowKey(list, i, "PositionError"), j, "Correction"), QuantityPositionErrorCorrection, y, p[j-1].cas()-x, QuantityPositionErrorCorrection.Domain().Max,
				"the calibrated airspeed must rise with the indicated one")
		}
	}
}

func (e *Engine) validate(f *faults, propeller PropellerKind) {
	f.check("Engine.RatedPower", QuantityRatedPower, e.RatedPower)
	if propeller == FixedPitch || propeller == Tabulated || e.RatedSpeed != 0 {
		f.check("Engine.RatedSpeed", QuantityRatedSpeed, e.RatedSpeed)
	}
	f.optional("Engine.MaximumSpeed", QuantityMaximumSpeed, e.MaximumSpeed)
	switch e.Kind {
	case Piston:
		f.check("Engine.FullThrottleAltitude", QuantityFullThrottleAltitude, e.FullThrottleAltitude)
		f.check("Engine.DropOffConstant", QuantityDropOffConstant, e.DropOffConstant)
		if e.Law > DensityAltitudeLaw {
			f.add("Engine.Law", QuantityDropOffConstant, float64(e.Law), 0, float64(DensityAltitudeLaw), "there is no such power law")
		}
	case Turboprop:
		f.check("Engine.LapseExponent", QuantityLapseExponent, e.LapseExponent)
		f.optional("Engine.ThermalPower", QuantityThermalPower, e.ThermalPower)
	case Electric:
		return
	default:
		f.add("Engine.Kind", QuantityRatedPower, float64(e.Kind), 0, float64(Electric), "there is no such engine kind")
		return
	}
	t := e.ConsumptionTable
	switch {
	case len(t) == 0:
		f.optional("Engine.SpecificConsumption", QuantitySpecificConsumption, e.SpecificConsumption)
	case len(t) > maximumRows:
		f.add("Engine.ConsumptionTable", QuantitySpecificConsumption, float64(len(t)), 0, maximumRows, "how many rows there are")
		return
	}
	for i := range t {
		f.row("Engine.ConsumptionTable", i, "SpecificConsumption", QuantitySpecificConsumption, t[i].SpecificConsumption)
		x := t[i].PowerFraction
		if !(x >= 0 && x <= 2) {
			f.add(rowKey("Engine.ConsumptionTable", i, "PowerFraction"), QuantityPowerFraction, x, 0, 2, "a fraction of rated power")
		} else if i > 0 && !(x > t[i-1].PowerFraction) {
			f.add(rowKey("Engine.ConsumptionTable", i, "PowerFraction"), QuantityPowerFraction, x, t[i-1].PowerFraction, 2, "the power fractions must rise")
		}
	}
}

func (p *Propeller) validate(f *faults, g *propellerTable) {
	if p.Kind != ConstantEfficiency {
		f.check("Propeller.Diameter", QuantityDiameter, p.Diameter)
	}
	switch p.Kind {
	case ConstantEfficiency:
		f.check("Propeller.Efficiency", QuantityPropellerEfficiency, p.Efficiency)
	case ConstantSpeed:
		f.check("Propeller.BladeEfficiency", QuantityBladeEfficiency, p.BladeEfficiency)
	case FixedPitch:
		f.check("Propeller.PolarSlope", QuantityPolarSlope, p.PolarSlope)
		f.check("Propeller.PolarIntercept", QuantityPolarIntercept, p.PolarIntercept)
		f.check("Propeller.PowerCoefficientStatic", QuantityPowerCoefficientStatic, p.PowerCoefficientStatic)
		f.check("Propeller.PowerCoefficientSlope", QuantityPowerCoefficientSlope, p.PowerCoefficientSlope)
	case Tabulated:
		p.validateTable(f, g)
	default:
		f.add("Propeller.Kind", QuantityPropellerEfficiency, float64(p.Kind), 0, float64(Tabulated), "there is no such propeller kind")
	}
}

func (p *Propeller) validateTable(f *faults, g *propellerTable) {
	const list = "Propeller.Table"
	t := p.Table
	if len(t) < 3 || len(t) > maximumRows {
		f.add(list, QuantityAdvanceRatio, float64(len(t)), 3, maximumRows, "how many rows there are")
		return
	}
	before := len(*f)
	for i := range t {
		f.row(list, i, "AdvanceRatio", QuantityAdvanceRatio, t[i].AdvanceRatio)
		f.row(list, i, "ThrustCoefficient", QuantityThrustCoefficient, t[i].ThrustCoefficient)
		f.row(list, i, "PowerCoefficient", QuantityPowerCoefficient, t[i].PowerCoefficient)
	}
	if len(*f) > before {
		return
	}
	for i := range t {
		j, ct, cp := t[i].AdvanceRatio, t[i].ThrustCoefficient, t[i].PowerCoefficient
		if i == 0 {
			if !(ct >= leastStaticThrust) {
				f.add(rowKey(list, 0, "ThrustCoefficient"), QuantityThrustCoefficient, ct, leastStaticThrust, QuantityThrustCoefficient.Domain().Max, "the first row must give thrust")
			}
			continue
		}
		k, kt, kp := t[i-1].AdvanceRatio, t[i-1].ThrustCoefficient, t[i-1].PowerCoefficient
		switch {
		case !(j-k >= 1e-6):
			f.add(rowKey(list, i, "AdvanceRatio"), QuantityAdvanceRatio, j, k, QuantityAdvanceRatio.Domain().Max, "the advance ratios must rise")
		case ct > 0 && kt <= 0:
			f.add(rowKey(list, i, "ThrustCoefficient"), QuantityThrustCoefficient, ct, QuantityThrustCoefficient.Domain().Min, 0, "thrust comes back after it has gone")
		case ct > 0 && !(ct*k*k < kt*j*j):
			f.add(rowKey(list, i, "ThrustCoefficient"), QuantityThrustCoefficient, ct, 0, kt*j*j/(k*k), "CT/J^2 must fall while there is thrust")
		case !(j*j*kp > k*k*cp):
			f.add(rowKey(list, i, "PowerCoefficient"), QuantityPowerCoefficient, cp, 0, kp*j*j/(k*k), "J^2/CP must rise")
		}
	}
	if len(*f) > before {
		return
	}
	// Between the rows the same two laws must hold, or one speed would have two advance ratios.
	g.set(t)
	if i := g.crooked(); i >= 0 {
		f.add(rowKey(list, i, "AdvanceRatio"), QuantityAdvanceRatio, t[i].AdvanceRatio, 0, 0, "the rows around it bend too much: one speed would have two advance ratios")
	}
}

// Validate reports every fault of the condition for aeroplane a as joined *DomainError, or nil.
func (c *Condition) Validate(a *Aeroplane) error {
	var f faults
	c.validate(&f, a)
	return f.err()
}

func (c *Condition) validate(f *faults, a *Aeroplane) {
	f.check("Mass", QuantityMass, c.Mass)
	c.Air.check(f)
	if c.Configuration < 0 || c.Configuration >= len(a.Configurations) {
		f.add("Configuration", QuantityMaximumLift, float64(c.Configuration), 0, float64(max(0, len(a.Configurations)-1)), "there is no such configuration")
	}
	f.check("Bank", QuantityBank, c.Bank)
	f.check("PowerFraction", QuantityPowerFraction, c.PowerFraction)
	f.check("Headwind", QuantityHeadwind, c.Headwind)
	if a.Engine.Kind == Electric {
		f.check("Fuel", QuantityUsableEnergy, c.Fuel)
	} else {
		f.check("Fuel", QuantityFuel, c.Fuel)
	}
	f.check("ClimbGradient", QuantityClimbGradient, c.ClimbGradient)
}

// finite is x, or 0 where it is none: the last gate before an answer leaves.
func finite(x float64) float64 {
	if math.IsNaN(x) || math.IsInf(x, 0) {
		return 0
	}
	return x
}
