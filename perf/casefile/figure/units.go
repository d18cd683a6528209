package figure

import (
	"levelspan/perf"
	"levelspan/perf/casefile"
)

// Unit is a unit of the trade: its name and its size in SI.
type Unit struct {
	Name string
	SI   float64
}

// Units are the units that the person chose.
type Units struct {
	SpeedKind string // CAS, IAS or TAS
	Speed     Unit
	Altitude  Unit
	Mass      Unit
	Power     Unit
	Fuel      Unit // SI: kg in one unit, also of a volume
	Length    Unit
	Distance  Unit // goes with Speed
	RateUnit  Unit // of climb, goes with Altitude
	Electric  bool // fuel is charge
}

// Fuel densities, kg/m^3, where the case gives none; common practice.
const (
	petrol   = 720
	kerosene = 800
)

// Of is the units that a case is shown in.
func Of(c *casefile.Case) Units {
	density := float64(petrol)
	if c.Aeroplane.Engine.Kind == casefile.Turboprop {
		density = kerosene
	}
	if f := c.Aeroplane.Fuel; f != nil && f.DensityKgPerL != nil {
		density = *f.DensityKgPerL / perf.Litre
	}
	u := FromDisplay(c.Display, density)
	u.Electric = c.Aeroplane.Engine.Kind == casefile.Electric
	return u
}

// FromDisplay is the units that a display asks for; fuelDensity in kg/m^3. What it does not name is in kt, ft, kg, kW, m
// and CAS.
func FromDisplay(d casefile.Display, fuelDensity float64) Units {
	u := Units{
		SpeedKind: "CAS", Speed: Unit{"kt", perf.Knot}, Distance: Unit{"nm", perf.NauticalMile},
		Altitude: Unit{"ft", perf.Foot}, RateUnit: Unit{"ft/min", perf.FootPerMin},
		Mass: Unit{"kg", 1}, Power: Unit{"kW", perf.Kilowatt}, Fuel: Unit{"kg", 1}, Length: Unit{"m", 1},
	}
	if d.SpeedKind == "IAS" || d.SpeedKind == "TAS" {
		u.SpeedKind = d.SpeedKind
	}
	switch d.Speed {
	case "mph":
		u.Speed, u.Distance = Unit{"mph", perf.MilePerHour}, Unit{"mi", perf.StatuteMile}
	case "km/h":
		u.Speed, u.Distance = Unit{"km/h", perf.KmPerHour}, Unit{"km", perf.Kilometre}
	}
	if d.Altitude == "m" {
		u.Altitude, u.RateUnit = Unit{"m", 1}, Unit{"m/s", 1}
	}
	if d.Mass == "lb" {
		u.Mass = Unit{"lb", perf.Pound}
	}
	if d.Power == "hp" {
		u.Power = Unit{"hp", perf.Horsepower}
	}
	if d.Length == "ft" {
		u.Length = Unit{"ft", perf.Foot}
	}
	switch d.Fuel {
	case "L":
		u.Fuel = Unit{"L", perf.Litre * fuelDensity}
	case "US gal":
		u.Fuel = Unit{"US" + Group + "gal", perf.USGallon * fuelDensity}
	}
	return u
}

// SpeedLabel heads a column of speeds: "kt CAS".
func (u Units) SpeedLabel() string { return u.Speed.Name + " " + u.SpeedKind }

// SpeedOf is a limit's speed of the chosen kind, m/s.
func (u Units) SpeedOf(l *perf.Limit) float64 {
	switch u.SpeedKind {
	case "IAS":
		return float64(l.IAS)
	case "TAS":
		return float64(l.TAS)
	}
	return float64(l.CAS)
}
