package perf

import (
	"math"
	"math/rand/v2"
	"testing"
)

func TestStandardDayIsItself(t *testing.T) {
	for h := -2000.0; h <= 20000; h += 125 {
		a, err := AirAtDensityAltitude(h)
		if err != nil {
			t.Fatal(err)
		}
		if math.Abs(a.DensityAltitude-h) > 1e-7 || a.PressureAltitude != h {
			t.Errorf("at %g m the density altitude is %.12g", h, a.DensityAltitude)
		}
		_, p := standard(h)
		if back := heightOfPressure(p); math.Abs(back-h) > 1e-7 {
			t.Errorf("pressure of %g m comes back as %.12g", h, back)
		}
	}
	if rho := StandardAir().Density; math.Abs(rho-1.225) > 5e-8 {
		t.Errorf("sea-level density is %.9g", rho)
	}
}

func TestAtmosphereIsContinuousAndFalls(t *testing.T) {
	_, below := standard(tropopause)
	_, above := standard(math.Nextafter(tropopause, 1e9))
	if relative(below, above) > 1e-14 {
		t.Errorf("pressure jumps at the tropopause: %.17g, %.17g", below, above)
	}
	for _, d := range []day{{}, {deviation: 40}, {deviation: -40}, {deviation: 30, humid: true}, {deviation: 15, humid: true, depression: 5}} {
		last := math.Inf(1)
		for h := -2000.0; h <= 20000; h += 50 {
			s := d.at(h)
			if !(s.density < last) {
				t.Fatalf("%+v: density rises at %g m", d, h)
			}
			last = s.density
		}
	}
}

func TestHumidAirIsThinner(t *testing.T) {
	dry, _ := AirAt(500, 303, 0)
	humid, err := AirAt(500, 303, 298)
	if err != nil {
		t.Fatal(err)
	}
	if humid.Density >= dry.Density || humid.DensityAltitude <= dry.DensityAltitude || humid.Pressure != dry.Pressure || humid.SpeedOfSound <= dry.SpeedOfSound {
		t.Errorf("dry %+v\nhumid %+v", dry, humid)
	}
}

func TestMovedAirKeepsTheDay(t *testing.T) {
	r := rand.New(rand.NewPCG(1, 1))
	for range 500 {
		h := -1500 + 12000*r.Float64()
		temp := StandardTemperature(h) - 20 + 40*r.Float64()
		dew := 0.0
		if r.IntN(2) == 0 {
			dew = temp - 15*r.Float64()
		}
		a, err := AirAt(h, temp, dew)
		if err != nil {
			t.Fatal(err)
		}
		to := -1500 + 12000*r.Float64()
		b, err := a.MovedToPressureAltitude(to)
		if err != nil {
			t.Fatal(err)
		}
		if d := (b.Temperature - StandardTemperature(to)) - (temp - StandardTemperature(h)); math.Abs(d) > 1e-9 {
			t.Errorf("the deviation moved by %g", d)
		}
		if dew > 0 && math.Abs((b.Temperature-b.DewPoint)-(temp-dew)) > 1e-9 {
			t.Errorf("the depression moved")
		}
		back, err := b.MovedToPressureAltitude(h)
		if err != nil || relative(back.Density, a.Density) > 1e-12 {
			t.Errorf("there and back: %v, %.15g, %.15g", err, back.Density, a.Density)
		}
		c, err := a.MovedToDensityAltitude(b.DensityAltitude)
		if err != nil || math.Abs(c.PressureAltitude-to) > 1e-5 {
			t.Errorf("to density altitude %g: %v, %.9g m, want %.9g", b.DensityAltitude, err, c.PressureAltitude, to)
		}
	}
}

func TestFieldAir(t *testing.T) {
	a, err := AirAtField(300, SeaLevelPressure, 290, 0)
	if err != nil || math.Abs(a.PressureAltitude-300) > 1e-9 {
		t.Errorf("with the standard setting the pressure altitude is %g, %v", a.PressureAltitude, err)
	}
	low, _ := AirAtField(300, 99000, 290, 0)
	if d := low.PressureAltitude - 300; d < 190 || d > 200 {
		t.Errorf("23 hPa below standard is %g m", d)
	}
}

func TestAirRefuses(t *testing.T) {
	good := StandardAir()
	bad := good
	bad.Density *= 1.1
	_, e1 := AirAt(math.NaN(), 288, 0)
	_, e2 := AirAt(20001, 288, 0)
	_, e3 := AirAt(0, 400, 0)
	_, e4 := AirAt(0, 288, 289)
	_, e5 := AirAt(0, 288, -1)
	_, e6 := AirAtDensityAltitude(-2001)
	_, e7 := AirAtField(math.Inf(1), 101325, 288, 0)
	_, e8 := AirAtField(0, 70000, 288, 0)
	_, e9 := good.MovedToPressureAltitude(25000)
	_, e10 := good.MovedToDensityAltitude(math.NaN())
	_, e11 := good.MovedToDensityAltitude(21000)
	_, e12 := Air{}.MovedToPressureAltitude(0)
	_, e13 := bad.MovedToDensityAltitude(0)
	_, e14 := AirAt(18000, 340, 340) // more vapour than air
	_, e15 := AirAt(math.NaN(), math.Inf(1), 0)
	for i, err := range []error{e1, e2, e3, e4, e5, e6, e7, e8, e9, e10, e11, e12, e13, e14, e15} {
		f := Faults(err)
		if len(f) == 0 {
			t.Errorf("case %d was taken: %v", i+1, err)
			continue
		}
		if f[0].Key == "" || f[0].Error() == "" {
			t.Errorf("case %d says nothing", i+1)
		}
	}
	if n := len(Faults(e15)); n != 2 {
		t.Errorf("two faults, %d told", n)
	}
	const want = "PressureAltitude: pressure altitude 20001 m is outside -2000 to 20000"
	if got := e2.Error(); got != want {
		t.Errorf("the error reads %q, want %q", got, want)
	}
}

func TestAirspeedsRoundTrip(t *testing.T) {
	for h := -2000.0; h <= 20000; h += 1000 {
		for _, dev := range []float64{-30, 0, 35} {
			a, err := AirAt(h, StandardTemperature(h)+dev, 0)
			if err != nil {
				t.Fatal(err)
			}
			for v := 0.5; v < 300; v *= 1.3 {
				if back := a.CASFromTAS(a.TASFromCAS(CAS(v))); relative(float64(back), v) > 1e-12 {
					t.Errorf("%g m: CAS %g comes back %.15g", h, v, float64(back))
				}
				if back := a.TASFromCAS(a.CASFromTAS(TAS(v))); relative(float64(back), v) > 1e-12 {
					t.Errorf("%g m: TAS %g comes back %.15g", h, v, float64(back))
				}
				if back := a.TASFromEAS(a.EASFromTAS(TAS(v))); relative(float64(back), v) > 1e-14 {
					t.Errorf("%g m: TAS %g through EAS comes back %.15g", h, v, float64(back))
				}
			}
		}
	}
	sea := StandardAir()
	for v := 1.0; v < 300; v += 7 {
		if got := sea.CASFromTAS(TAS(v)); relative(float64(got), v) > 1e-13 {
			t.Errorf("at the standard sea level TAS %g is CAS %.15g", v, float64(got))
		}
	}
}

// TestSlowAirspeedIsTheIncompressibleOne: at small Mach numbers TAS is CAS/sqrt(sigma).
func TestSlowAirspeedIsTheIncompressibleOne(t *testing.T) {
	a, _ := AirAt(3000, 280, 0)
	for _, v := range []float64{1e-6, 1e-3, 0.1, 3} {
		want := v / math.Sqrt(a.Density/SeaLevelDensity)
		if got := float64(a.TASFromCAS(CAS(v))); relative(got, want) > 1e-4*v*v/9+1e-9 {
			t.Errorf("CAS %g: TAS %.12g, incompressible %.12g", v, got, want)
		}
	}
}

func TestPositionErrorInverts(t *testing.T) {
	c := Configuration{PositionError: []PositionErrorPoint{{20, 2}, {30, -1}, {45, 0.5}, {80, -3}}}
	last := CAS(-100)
	for v := IAS(1); v < 120; v += 0.37 {
		cas := c.CASFromIAS(v)
		if cas <= last {
			t.Fatalf("CAS falls at %g", float64(v))
		}
		last = cas
		if back := c.IASFromCAS(cas); relative(float64(back), float64(v)) > 1e-13 {
			t.Errorf("IAS %g comes back %.15g", float64(v), float64(back))
		}
	}
	for _, x := range []struct {
		ias IAS
		cas CAS
	}{{10, 12}, {20, 22}, {25, 25.5}, {30, 29}, {62.5, 61.25}, {80, 77}, {100, 97}} {
		if got := c.CASFromIAS(x.ias); math.Abs(float64(got-x.cas)) > 1e-12 {
			t.Errorf("IAS %g is CAS %g, want %g", float64(x.ias), float64(got), float64(x.cas))
		}
	}
	var none Configuration
	if none.CASFromIAS(33) != 33 || none.IASFromCAS(33) != 33 {
		t.Error("without points CAS is not IAS")
	}
}
