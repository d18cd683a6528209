package casefile

import (
	"math"

	"levelspan/perf"
)

// Model gives what perf computes with. It fails only where Validate would.
func (c *Case) Model() (perf.Aeroplane, perf.Condition, error) {
	if err := c.Validate(); err != nil {
		return perf.Aeroplane{}, perf.Condition{}, err
	}
	return c.model()
}

func (c *Case) model() (perf.Aeroplane, perf.Condition, error) {
	a, t := &c.Aeroplane, &c.Today
	m := perf.Aeroplane{
		WingArea: a.WingAreaM2, WingSpan: a.WingSpanM, EmptyMass: a.EmptyMassKg, MaximumMass: a.MaximumMassKg,
		Polar:     perf.Polar{ParasiteDrag: a.Polar.CD0, OswaldEfficiency: a.Polar.OswaldE, LiftOfLeastDrag: a.Polar.CLMinDrag},
		Engine:    a.Engine.model(),
		Propeller: a.Propeller.model(),
		Placards: perf.Placards{
			NeverExceedCAS: perf.CAS(orZero(a.Placards.VNECASMps)), NeverExceedTAS: perf.TAS(orZero(a.Placards.VNETASMps)),
			NormalOperatingCAS: perf.CAS(orZero(a.Placards.VNOCASMps)), ManoeuvringCAS: perf.CAS(orZero(a.Placards.VACASMps)),
			FlapsExtendedCAS: perf.CAS(orZero(a.Placards.VFECASMps))},
	}
	electric := a.Engine.Kind == Electric
	onBoard := t.FuelKg
	switch {
	case electric && a.Battery != nil:
		m.UsableEnergy = within(perf.QuantityUsableEnergy, a.Battery.UsableKWh*perf.KilowattHour)
		onBoard = m.UsableEnergy
		if t.ChargeKWh != nil {
			onBoard = math.Min(onBoard, *t.ChargeKWh*perf.KilowattHour)
		}
	case electric:
		onBoard = 0
	case a.Fuel != nil:
		m.UsableFuel = a.Fuel.UsableKg
	}
	m.Configurations = make([]perf.Configuration, len(a.Configurations))
	for i, k := range a.Configurations {
		m.Configurations[i] = perf.Configuration{Name: k.Name, MaximumLift: k.CLMax, ParasiteDragRise: k.DeltaCD0}
		for _, cal := range a.Calibration {
			if cal.Configuration != k.Name {
				continue
			}
			for _, p := range cal.Points {
				m.Configurations[i].PositionError = append(m.Configurations[i].PositionError,
					perf.PositionErrorPoint{IAS: perf.IAS(p.IASMps), Correction: p.CASMinusIASMps})
			}
		}
	}
	dewPoint := 0.0
	if t.DewPointC != nil {
		dewPoint = within(perf.QuantityDewPoint, *t.DewPointC+perf.ZeroCelsius)
	}
	air, err := perf.AirAt(t.PressureAltitudeM, within(perf.QuantityTemperature, t.OutsideAirTemperatureC+perf.ZeroCelsius), dewPoint)
	return m, perf.Condition{
		Mass: t.MassKg, Air: air, Configuration: max(0, c.configuration(t.Configuration)),
		Bank:          within(perf.QuantityBank, t.BankDeg*perf.Degree),
		PowerFraction: t.PowerFraction, Headwind: t.HeadwindMps, Fuel: onBoard, ClimbGradient: orZero(t.ClimbGradient),
	}, err
}

func (e *Engine) model() perf.Engine {
	m := perf.Engine{RatedPower: e.RatedPowerW, RatedSpeed: within(perf.QuantityRatedSpeed, e.RatedRPM*perf.RevPerMin)}
	if e.MaximumRPM != nil {
		m.MaximumSpeed = within(perf.QuantityMaximumSpeed, *e.MaximumRPM*perf.RevPerMin)
	}
	switch e.Kind {
	case Electric:
		m.Kind = perf.Electric
		return m
	case Turboprop:
		m.Kind = perf.Turboprop
		m.LapseExponent, m.ThermalPower = e.LapseExponent, orZero(e.ThermalPowerW)
	default:
		m.Kind = perf.Piston
		if e.PowerLaw == DensityAltitude {
			m.Law = perf.DensityAltitudeLaw
		}
		m.FullThrottleAltitude, m.DropOffConstant = e.FullThrottleAltitudeM, e.DropOffConstant
	}
	m.SpecificConsumption = within(perf.QuantitySpecificConsumption, e.SpecificConsumptionKgPerKWh/perf.KilowattHour)
	for _, p := range e.ConsumptionTable {
		m.ConsumptionTable = append(m.ConsumptionTable, perf.ConsumptionPoint{PowerFraction: p.PowerFraction,
			SpecificConsumption: within(perf.QuantitySpecificConsumption, p.KgPerKWh/perf.KilowattHour)})
	}
	return m
}

func (p *Propeller) model() perf.Propeller {
	switch p.Kind {
	case ConstantSpeed:
		return perf.Propeller{Kind: perf.ConstantSpeed, Diameter: p.DiameterM, BladeEfficiency: p.BladeEfficiency}
	case FixedPitch:
		return perf.Propeller{Kind: perf.FixedPitch, Diameter: p.DiameterM, PolarSlope: p.PolarSlope, PolarIntercept: p.PolarIntercept,
			PowerCoefficientStatic: p.PowerCoefficientStatic, PowerCoefficientSlope: p.PowerCoefficientSlope}
	case Table:
		m := perf.Propeller{Kind: perf.Tabulated, Diameter: p.DiameterM, Table: make([]perf.PropellerRow, len(p.AdvanceRatio))}
		for i, j := range p.AdvanceRatio {
			m.Table[i] = perf.PropellerRow{AdvanceRatio: j, ThrustCoefficient: p.ThrustCoefficient[i], PowerCoefficient: p.PowerCoefficient[i]}
		}
		return m
	}
	return perf.Propeller{Kind: perf.ConstantEfficiency, Efficiency: p.Efficiency}
}

// within takes out the last digit's rounding of a change of unit at the ends of a range.
func within(q perf.Quantity, x float64) float64 {
	d := q.Domain()
	return math.Max(d.Min, math.Min(d.Max, x))
}

func orZero(p *float64) float64 {
	if p == nil {
		return 0
	}
	return *p
}
