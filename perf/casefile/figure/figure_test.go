package figure

import (
	"math"
	"strings"
	"testing"

	"levelspan/perf"
	"levelspan/perf/casefile"
)

// ascii puts the special characters into ones that a test can show.
func ascii(s string) string { return strings.NewReplacer(Group, " ", Minus, "-", None, "?").Replace(s) }

func TestNumber(t *testing.T) {
	for _, x := range []struct {
		value    float64
		decimals int
		want     string
	}{
		{0, 0, "0"}, {math.Copysign(0, -1), 0, "0"}, {-0.04, 1, "0.0"}, {-0.06, 1, "-0.1"}, {999.4, 0, "999"}, {999.5, 0, "1 000"}, {1234567.891, 2, "1 234 567.89"},
		{-14600, 0, "-14 600"}, {math.NaN(), 0, "?"}, {math.Inf(-1), 3, "?"}, {2.5, 0, "2"}, {3.5, 0, "4"},
	} {
		if got := ascii(Number(x.value, x.decimals)); got != x.want {
			t.Errorf("Number(%v, %d) = %q, want %q", x.value, x.decimals, got, x.want)
		}
	}
}

func TestEveryQuantityInBothSystems(t *testing.T) {
	trade := FromDisplay(casefile.Display{Speed: "kt", Altitude: "ft", Mass: "lb", Power: "hp", Fuel: "US gal", Length: "ft"}, 720)
	metric := FromDisplay(casefile.Display{Speed: "km/h", Altitude: "m", Mass: "kg", Power: "kW", Fuel: "L", Length: "m"}, 720)
	road := FromDisplay(casefile.Display{Speed: "mph"}, 720)
	plain := FromDisplay(casefile.Display{}, 0)
	electric := metric
	electric.Electric = true
	// The right-hand sides are worked by hand from the exact units: 45.8 m/s is 89.03 kt, 164.88 km/h, 102.45 mph.
	for _, x := range []struct {
		got  Figure
		want string
	}{
		{trade.SpeedWhole(45.8), "89 kt"}, {trade.SpeedFine(45.8), "89.0 kt"}, {metric.SpeedFine(45.8), "164.9 km/h"}, {road.SpeedFine(45.8), "102.5 mph"},
		{trade.AltitudeCoarse(1919.25), "6 300 ft"}, {trade.AltitudeWhole(1200), "3 940 ft"}, {trade.AltitudeFine(1200), "3 937 ft"},
		{metric.AltitudeCoarse(1919.25), "1 900 m"}, {metric.AltitudeWhole(1203), "1 205 m"}, {metric.AltitudeFine(-12.4), "-12 m"},
		{trade.MassWhole(760), "1 676 lb"}, {trade.MassFine(760), "1 675.5 lb"}, {metric.MassFine(760), "760.0 kg"},
		{trade.Rate(2.0), "394 ft/min"}, {metric.Rate(2.0), "2.00 m/s"}, {metric.Rate(-0.001), "0.00 m/s"},
		{trade.Gradient(0.0614), "373 ft/nm"}, {metric.Gradient(0.0614), "6.1%"}, {road.Gradient(0.0614), "6.1%"},
		{trade.PowerFine(74600), "100.0 hp"}, {metric.PowerWhole(74600), "75 kW"},
		{trade.FuelWhole(57.6), "21 US gal"}, {metric.FuelWhole(57.6), "80 L"}, {plain.FuelWhole(57.6), "58 kg"}, {electric.FuelWhole(18 * perf.KilowattHour), "18.0 kWh"},
		{trade.FuelFlow(0.003), "4.0 US gal/h"}, {plain.FuelFlow(0.003), "10.8 kg/h"}, {electric.FuelFlow(17000), "17.0 kW"},
		{trade.DistanceWhole(948224), "512 nm"}, {metric.DistanceWhole(948224), "948 km"}, {road.DistanceWhole(948224), "589 mi"},
		{Hours(26640), "7.4 h"}, {Celsius(301.15), "+28 °C"}, {Celsius(268.15), "-5 °C"}, {Celsius(273.2), "0 °C"}, {Degrees(math.Pi / 4), "45°"}, {DegreesFine(0.8133), "46.6°"},
		{Hectopascals(100940), "1 009.4 hPa"}, {Density(1.22500), "1.2250 kg/m³"}, {Revolutions(45), "2 700 rpm"}, {Percent(0.65), "65%"}, {metric.Metres(86.2), "86 m"},
	} {
		if got := ascii(x.got.String()); got != x.want {
			t.Errorf("got %q, want %q", got, x.want)
		}
	}
	if got := ascii(GlideRatio(11.0667)); got != "11.1 : 1" {
		t.Errorf("glide ratio %q", got)
	}
	if trade.SpeedLabel() != "kt CAS" {
		t.Errorf("label %q", trade.SpeedLabel())
	}
}

func TestSpeedOfTheChosenKind(t *testing.T) {
	l := perf.Limit{IAS: 40, CAS: 41, TAS: 45}
	for kind, want := range map[string]float64{"IAS": 40, "CAS": 41, "TAS": 45, "": 41} {
		if got := FromDisplay(casefile.Display{SpeedKind: kind}, 720).SpeedOf(&l); got != want {
			t.Errorf("%q: %v, want %v", kind, got, want)
		}
	}
}

func TestFuelDensityFollowsTheEngine(t *testing.T) {
	c := &casefile.Case{}
	c.Display.Fuel = "L"
	for kind, want := range map[string]float64{casefile.Piston: 0.72, casefile.Turboprop: 0.8} {
		c.Aeroplane.Engine.Kind = kind
		if got := Of(c).Fuel.SI; math.Abs(got-want) > 1e-12 {
			t.Errorf("%s: %v kg/L", kind, got)
		}
	}
	density := 0.75
	c.Aeroplane.Fuel = &casefile.Fuel{UsableKg: 50, DensityKgPerL: &density}
	if got := Of(c).Fuel.SI; math.Abs(got-0.75) > 1e-12 {
		t.Errorf("given density: %v kg/L", got)
	}
}

// What is typed comes back as typed, in every field and every unit, and the ends of the range shown are allowed.
func TestEntryOfEveryField(t *testing.T) {
	displays := []casefile.Display{{}, {Speed: "mph", Altitude: "m", Mass: "lb", Power: "hp", Fuel: "US gal", Length: "ft"}, {Speed: "km/h", Fuel: "L", Mass: "lb"}}
	for _, d := range displays {
		u := FromDisplay(d, 720)
		for _, f := range casefile.Fields() {
			if f.Kind == casefile.KindText || f.Kind == casefile.KindChoice {
				continue
			}
			e := u.Entry(f)
			if !(e.ToFile(e.Min) >= f.Min && e.ToFile(e.Max) <= f.Max) {
				t.Errorf("%s in %s: shown as %s, allowed %v to %v %s, which is %v to %v", f.Path, e.Unit, e.Allowed(), f.Min, f.Max, f.Unit, e.ToFile(e.Min), e.ToFile(e.Max))
			}
			for _, part := range []float64{0, 0.1, 0.37, 0.5, 1} {
				typed := e.Format(e.ToFile(e.Min + part*(e.Max-e.Min)))
				file, ok := e.Parse(typed)
				if !ok || e.Format(file) != typed {
					t.Errorf("%s: %q comes back as %q", f.Path, typed, e.Format(file))
				}
			}
		}
	}
}

func TestEntryParse(t *testing.T) {
	f, _ := casefile.FieldOf("today.headwind_mps")
	e := FromDisplay(casefile.Display{}, 720).Entry(f)
	for typed, want := range map[string]float64{"6": 6, "6.5": 6.5, "6,5": 6.5, "-3": -3, Minus + "3": -3, " 1" + Group + "0 ": 10, "1e1": 10} {
		if got, ok := e.Parse(typed); !ok || math.Abs(got-want*perf.Knot) > 1e-12 {
			t.Errorf("%q: %v, %v", typed, got, ok)
		}
	}
	for _, typed := range []string{"", "-", ".", "x", "1..2", "NaN", "Inf", "0x10", "1e999", "1_0", "5 kt"} {
		if got, ok := e.Parse(typed); ok {
			t.Errorf("%q is read as %v", typed, got)
		}
	}
	power, _ := casefile.FieldOf("aeroplane.engine.rated_power_w")
	if got, ok := FromDisplay(casefile.Display{}, 720).Entry(power).Parse("1e308"); ok {
		t.Errorf("1e308 kW is read as %v", got)
	}
	if got := ascii(e.Text(6 * perf.Knot)); got != "6 kt" {
		t.Errorf("text %q", got)
	}
}

func TestEntryInTheUnitsOfTheTrade(t *testing.T) {
	imperial := FromDisplay(casefile.Display{Speed: "kt", Altitude: "ft", Mass: "lb", Power: "hp", Fuel: "US gal", Length: "ft"}, 720)
	metric := FromDisplay(casefile.Display{Speed: "km/h", Altitude: "m", Fuel: "L"}, 720)
	// Worked by hand: 16.5 m² is 177.605 ft², 74600 W is 100.040 hp, 0.3 kg/kWh is 0.493196 lb/hp/h, 57.6 kg of petrol are 80 L or 21.1338 US gal.
	for _, x := range []struct {
		units Units
		path  string
		file  float64
		text  string
	}{
		{imperial, "aeroplane.wing_area_m2", 16.5, "177.605 ft²"}, {metric, "aeroplane.wing_area_m2", 16.5, "16.5 m²"}, {imperial, "aeroplane.wing_span_m", 10.8, "35.4331 ft"},
		{imperial, "aeroplane.engine.rated_power_w", 74600, "100.04 hp"}, {metric, "aeroplane.engine.rated_power_w", 74600, "74.6 kW"},
		{imperial, "aeroplane.engine.specific_consumption_kg_per_kwh", 0.3, "0.493196 lb/hp/h"}, {metric, "aeroplane.engine.specific_consumption_kg_per_kwh", 0.3, "0.3 kg/kWh"},
		{imperial, "aeroplane.fuel.usable_kg", 57.6, "21.1338 US gal"}, {metric, "aeroplane.fuel.usable_kg", 57.6, "80 L"},
		{imperial, "today.pressure_altitude_m", 1200, "3937.01 ft"}, {metric, "today.headwind_mps", 3, "10.8 km/h"}, {imperial, "runs[0].rate_mps", 2, "393.701 ft/min"},
		{metric, "runs[0].rate_mps", 2, "2 m/s"}, {imperial, "aeroplane.polar.cd0", 0.034, "0.034"}, {imperial, "today.outside_air_temperature_c", -5.5, "-5.5 °C"},
		{imperial, "aeroplane.engine.rated_rpm", 2750, "2750 rpm"}, {metric, "today.reserve_min", 30, "30 min"}, {metric, "today.bank_deg", 0, "0°"},
	} {
		f, ok := casefile.FieldOf(x.path)
		if !ok {
			t.Fatal(x.path)
		}
		if got := ascii(x.units.Entry(f).Text(x.file)); got != x.text {
			t.Errorf("%s: %q, want %q", x.path, got, x.text)
		}
	}
}

// A range is shown rounded to its inside, never wider than it is.
func TestAllowedIsRoundedInward(t *testing.T) {
	f, _ := casefile.FieldOf("aeroplane.wing_area_m2")
	e := FromDisplay(casefile.Display{Length: "ft"}, 720).Entry(f)
	if got := ascii(e.Allowed()); got != "5.382 to 10760 ft²" { // 0.5 m² is 5.38196 ft², 1000 m² are 10763.9 ft²
		t.Errorf("allowed %q", got)
	}
	f, _ = casefile.FieldOf("today.outside_air_temperature_c")
	if got := ascii(FromDisplay(casefile.Display{}, 720).Entry(f).Allowed()); got != "-100 to 70 °C" {
		t.Errorf("allowed %q", got)
	}
	for _, x := range []struct{ value, toward, want float64 }{{0, 1, 0}, {5.38196, 1, 5.382}, {5.38196, -1, 5.381}, {-5.38196, 1, -5.381}, {-5.38196, -1, -5.382}, {800, 1, 800}, {0.05, -1, 0.05}} {
		if got := inward(x.value, x.toward); math.Abs(got-x.want) > 1e-12 {
			t.Errorf("inward(%v, %v) = %v, want %v", x.value, x.toward, got, x.want)
		}
	}
}

func TestFiguresThatAreNotFinite(t *testing.T) {
	f, _ := casefile.FieldOf("today.mass_kg")
	e := FromDisplay(casefile.Display{}, 720).Entry(f)
	if e.Format(math.NaN()) != None || e.Format(math.Inf(1)) != None || e.Format(math.Copysign(0, -1)) != "0" {
		t.Errorf("%q %q %q", e.Format(math.NaN()), e.Format(math.Inf(1)), e.Format(math.Copysign(0, -1)))
	}
	if got := (Figure{"12", ""}).String(); got != "12" {
		t.Errorf("no unit: %q", got)
	}
}

func FuzzEntryParse(f *testing.F) {
	f.Add("12.5")
	f.Add("-1e400")
	f.Add("−5,2")
	f.Add("+.e")
	field, _ := casefile.FieldOf("aeroplane.empty_mass_kg")
	e := FromDisplay(casefile.Display{Mass: "lb"}, 720).Entry(field)
	f.Fuzz(func(t *testing.T, typed string) {
		x, ok := e.Parse(typed)
		if ok && (math.IsNaN(x) || math.IsInf(x, 0)) || !ok && x != 0 {
			t.Errorf("%q: %v, %v", typed, x, ok)
		}
	})
}
