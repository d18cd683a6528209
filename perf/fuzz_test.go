package perf

import (
	"encoding/binary"
	"math"
	"reflect"
	"testing"
)

// allFinite walks every figure of v.
func allFinite(t *testing.T, v any) {
	t.Helper()
	walk(t, reflect.Indirect(reflect.ValueOf(v)), "")
}

func walk(t *testing.T, v reflect.Value, path string) {
	t.Helper()
	switch v.Kind() {
	case reflect.Float64:
		if x := v.Float(); math.IsNaN(x) || math.IsInf(x, 0) {
			t.Errorf("%s is %g", path, x)
		}
	case reflect.Struct:
		for i := range v.NumField() {
			walk(t, v.Field(i), path+"."+v.Type().Field(i).Name)
		}
	case reflect.Array, reflect.Slice:
		for i := range v.Len() {
			walk(t, v.Index(i), path+"[]")
		}
	}
}

// source deals out figures from fuzzed bytes: mostly inside the domain, its very ends, and now and then anything at all.
type source struct{ data []byte }

func (s *source) byte() byte {
	if len(s.data) == 0 {
		return 0
	}
	b := s.data[0]
	s.data = s.data[1:]
	return b
}

func (s *source) any() float64 {
	var b [8]byte
	for i := range b {
		b[i] = s.byte()
	}
	return math.Float64frombits(binary.LittleEndian.Uint64(b[:]))
}

func (s *source) in(q Quantity) float64 {
	d := q.Domain()
	switch b := s.byte(); b {
	case 0:
		return d.Min
	case 255:
		return d.Max
	case 254:
		return s.any()
	case 253:
		return 0
	default:
		x := float64(b-1) / 251
		if d.Min > 0 && d.Max > 50*d.Min {
			return d.Min * math.Pow(d.Max/d.Min, x)
		}
		return d.Min + (d.Max-d.Min)*x
	}
}

func (s *source) fill(a *Aeroplane, c *Condition) {
	*a = Aeroplane{
		WingArea: s.in(QuantityWingArea), WingSpan: s.in(QuantityWingSpan), EmptyMass: s.in(QuantityEmptyMass), MaximumMass: s.in(QuantityMaximumMass),
		Polar:      Polar{s.in(QuantityParasiteDrag), s.in(QuantityOswaldEfficiency), s.in(QuantityLiftOfLeastDrag)},
		UsableFuel: s.in(QuantityUsableFuel), UsableEnergy: s.in(QuantityUsableEnergy),
	}
	for range s.byte()%3 + 1 {
		g := Configuration{MaximumLift: s.in(QuantityMaximumLift), ParasiteDragRise: s.in(QuantityParasiteDragRise)}
		for range s.byte() % 4 {
			g.PositionError = append(g.PositionError, PositionErrorPoint{IAS(s.in(QuantityPositionErrorIAS)), s.in(QuantityPositionErrorCorrection)})
		}
		a.Configurations = append(a.Configurations, g)
	}
	a.Engine = Engine{
		Kind: EngineKind(s.byte() % 4), Law: PowerLaw(s.byte() % 3), RatedPower: s.in(QuantityRatedPower), RatedSpeed: s.in(QuantityRatedSpeed),
		MaximumSpeed: s.in(QuantityMaximumSpeed), FullThrottleAltitude: s.in(QuantityFullThrottleAltitude), DropOffConstant: s.in(QuantityDropOffConstant),
		LapseExponent: s.in(QuantityLapseExponent), ThermalPower: s.in(QuantityThermalPower), SpecificConsumption: s.in(QuantitySpecificConsumption),
	}
	for range s.byte() % 4 {
		a.Engine.ConsumptionTable = append(a.Engine.ConsumptionTable, ConsumptionPoint{s.in(QuantityPowerFraction), s.in(QuantitySpecificConsumption)})
	}
	a.Propeller = Propeller{
		Kind: PropellerKind(s.byte() % 5), Efficiency: s.in(QuantityPropellerEfficiency), Diameter: s.in(QuantityDiameter), BladeEfficiency: s.in(QuantityBladeEfficiency),
		PolarSlope: s.in(QuantityPolarSlope), PolarIntercept: s.in(QuantityPolarIntercept),
		PowerCoefficientStatic: s.in(QuantityPowerCoefficientStatic), PowerCoefficientSlope: s.in(QuantityPowerCoefficientSlope),
	}
	j, ct, cp := 0.0, s.in(QuantityThrustCoefficient), s.in(QuantityPowerCoefficient)
	for range s.byte() % 8 {
		a.Propeller.Table = append(a.Propeller.Table, PropellerRow{j, ct, cp})
		j += s.in(QuantityAdvanceRatio) / 8
		ct *= float64(s.byte()) / 200
		ct -= float64(s.byte()%16) / 1000
		cp *= 0.5 + float64(s.byte())/400
	}
	a.Placards = Placards{CAS(s.in(QuantityPlacardSpeed)), TAS(s.in(QuantityPlacardSpeed)), CAS(s.in(QuantityPlacardSpeed)), CAS(s.in(QuantityPlacardSpeed)), CAS(s.in(QuantityPlacardSpeed))}
	h, temp, dew := s.in(QuantityPressureAltitude), s.in(QuantityTemperature), 0.0
	if s.byte()%2 == 1 {
		dew = s.in(QuantityDewPoint)
	}
	*c = Condition{
		Mass: s.in(QuantityMass), Configuration: int(s.byte()%4) - int(s.byte()%2), Bank: s.in(QuantityBank), PowerFraction: s.in(QuantityPowerFraction),
		Headwind: s.in(QuantityHeadwind), Fuel: s.in(QuantityFuel), ClimbGradient: s.in(QuantityClimbGradient),
	}
	if s.byte()%8 != 0 {
		dew = min(dew, temp)
		repair(a, c)
	}
	c.Air, _ = AirAt(h, temp, dew)
	if s.byte() == 7 {
		c.Air.Density = s.any()
	}
}

// repair puts right what must fit together, which chance alone seldom gets right.
func repair(a *Aeroplane, c *Condition) {
	a.MaximumMass = max(a.MaximumMass, a.EmptyMass)
	for i := range a.Configurations {
		g := &a.Configurations[i]
		g.MaximumLift = max(g.MaximumLift, a.Polar.LiftOfLeastDrag+0.05)
		g.ParasiteDragRise = max(g.ParasiteDragRise, 0.0031-a.Polar.ParasiteDrag)
		for j := range g.PositionError {
			g.PositionError[j].IAS = IAS(30 * (j + 1))
			g.PositionError[j].Correction = math.Mod(g.PositionError[j].Correction, 10)
		}
	}
	a.Engine.Kind, a.Engine.Law = a.Engine.Kind%3, a.Engine.Law%2
	for i := range a.Engine.ConsumptionTable {
		a.Engine.ConsumptionTable[i].PowerFraction = 0.2 + 0.3*float64(i)
	}
	a.Propeller.Kind %= 4
	for len(a.Propeller.Table) < 3 {
		n := len(a.Propeller.Table)
		a.Propeller.Table = append(a.Propeller.Table, PropellerRow{0.3 * float64(n), 0.1 - 0.03*float64(n), 0.05 - 0.005*float64(n)})
	}
	c.Configuration = min(max(c.Configuration, 0), len(a.Configurations)-1)
}

// checkSolve: whatever comes in, no panic, no endless loop, no figure that is none; and what is accepted is what Validate accepts.
func checkSolve(t *testing.T, data []byte) (solved bool) {
	var a Aeroplane
	var c Condition
	(&source{data}).fill(&a, &c)
	var z Solver
	var got Answer
	err := z.Solve(&a, &c, &got)
	allFinite(t, &got)
	if (err == nil) != (a.Validate() == nil && c.Validate(&a) == nil) {
		t.Errorf("Solve says %v, Validate %v and %v", err, a.Validate(), c.Validate(&a))
	}
	for _, v := range []TAS{-1, 0, 1e-300, 0.01, 1, 30, 200, 1e4, 1e300, TAS(math.NaN()), TAS(math.Inf(1))} {
		figures := [...]float64{z.Drag(v), z.Thrust(v), z.PowerRequired(v), z.PowerAvailable(v), z.Gradient(v), z.ClimbRate(v),
			z.ShaftPowerRequired(v), z.FuelFlow(v), z.LevelSpeed(v), z.FullSpeed(v), float64(z.StallSpeed())}
		allFinite(t, &figures)
	}
	if err != nil {
		return false
	}
	for k := range got.Limits {
		l := &got.Limits[k]
		if l.Applies && !(l.TAS > 0) {
			t.Errorf("%s applies at %g m/s", Key(k), float64(l.TAS))
		}
		if !l.Applies && *l != (Limit{}) {
			t.Errorf("%s does not apply, yet says %+v", Key(k), *l)
		}
	}
	return true
}

func FuzzSolve(f *testing.F) {
	f.Add([]byte{})
	f.Add([]byte("a light aeroplane with many numbers, none of which is quite right; but some are near enough to fly level, climb and glide"))
	for i := range 6 {
		b := make([]byte, 160)
		for k := range b {
			b[k] = byte(90 + (k*k*7+k*i*13)%60)
		}
		f.Add(b)
	}
	f.Fuzz(func(t *testing.T, data []byte) { checkSolve(t, data) })
}

// TestManyOddSolves is the fuzz target over a fixed stream, so that every run of the tests covers the corners of the domains. Most
// aeroplanes made of corners are refused; those that are not must have finite answers.
func TestManyOddSolves(t *testing.T) {
	state := uint64(1)
	next := func() byte {
		state = state*6364136223846793005 + 1442695040888963407
		return byte(state >> 56)
	}
	solved := 0
	for i := 0; i < 30000 && !t.Failed(); i++ {
		b := make([]byte, 200)
		for k := range b {
			b[k] = next()
			if i%3 != 0 && b[k] >= 253 {
				b[k] = 255 - b[k] // without what is refused anyway
			}
			if i%3 == 1 && b[k]%8 == 0 {
				b[k] = byte(b[k]/8%2) * 255 // the ends
			}
		}
		if checkSolve(t, b) {
			solved++
		}
	}
	if solved < 1500 {
		t.Errorf("only %d of the odd cases were solved", solved)
	}
}

func FuzzAir(f *testing.F) {
	f.Add(0.0, 288.15, 0.0, 101325.0, 1000.0)
	f.Add(5000.0, 320.0, 300.0, 90000.0, 20000.0)
	f.Add(math.NaN(), math.Inf(1), -1.0, 0.0, -1e300)
	f.Fuzz(func(t *testing.T, h, temp, dew, setting, to float64) {
		a, e1 := AirAt(h, temp, dew)
		b, e2 := AirAtField(h, setting, temp, dew)
		c, e3 := AirAtDensityAltitude(to)
		d, e4 := a.MovedToPressureAltitude(to)
		e, e5 := a.MovedToDensityAltitude(to)
		var zero Air
		for i, x := range []struct {
			air Air
			err error
		}{{a, e1}, {b, e2}, {c, e3}, {d, e4}, {e, e5}} {
			allFinite(t, &x.air)
			if x.err != nil && x.air != zero {
				t.Errorf("air %d came with %v", i, x.err)
			}
			if x.err != nil && len(Faults(x.err)) == 0 {
				t.Errorf("air %d: %v names no fault", i, x.err)
			}
			if x.err == nil {
				if !(x.air.Density > 0 && x.air.Pressure > 0 && x.air.SpeedOfSound > 0) {
					t.Errorf("air %d: %+v", i, x.air)
				}
				var f faults
				x.air.check(&f)
				if len(f) > 0 {
					t.Errorf("air %d is refused: %v", i, f.err())
				}
			}
		}
	})
}

func FuzzAirspeed(f *testing.F) {
	f.Add(1000.0, 290.0, 50.0, 20.0, 1.0, 40.0, -1.0)
	f.Add(19000.0, 200.0, 0.001, 1.0, -0.5, 300.0, 30.0)
	f.Add(0.0, 288.15, math.NaN(), math.Inf(1), math.NaN(), 0.0, -0.0)
	f.Fuzz(func(t *testing.T, h, temp, v, x0, c0, x1, c1 float64) {
		a, _ := AirAt(h, temp, 0)
		g := Configuration{MaximumLift: 1, PositionError: []PositionErrorPoint{{IAS(x0), c0}, {IAS(x1), c1}}}
		figures := [...]float64{float64(a.TASFromCAS(CAS(v))), float64(a.CASFromTAS(TAS(v))), float64(a.EASFromTAS(TAS(v))), float64(a.TASFromEAS(EAS(v))), ImpactPressure(CAS(v))}
		allFinite(t, &figures)
		for i, x := range figures {
			if x < 0 {
				t.Errorf("figure %d is %g", i, x)
			}
		}
		if a.Density > 0 && v > 1e-100 && v < 600 {
			if back := a.CASFromTAS(a.TASFromCAS(CAS(v))); relative(float64(back), v) > 1e-11 {
				t.Errorf("CAS %g comes back %g", v, float64(back))
			}
		}
		p := Aeroplane{Configurations: []Configuration{g}}
		var list faults
		p.validateConfiguration(&list, 0)
		ias := g.IASFromCAS(CAS(v))
		if len(list) == 0 && math.Abs(v) < 1e6 {
			if back := g.CASFromIAS(ias); math.Abs(float64(back)-v) > 1e-9*(1+math.Abs(v)) {
				t.Errorf("CAS %g comes back %g", v, float64(back))
			}
		}
	})
}
