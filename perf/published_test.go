package perf_test

// The published check values of testdata/published/checks.json, each with its source beside it there: air and airspeeds. What is read
// of a table is held to half a unit of its last digit, as the file's own tolerances say.

import (
	"encoding/json"
	"math"
	"os"
	"strings"
	"testing"

	. "levelspan/perf"
)

// publishedCheck is one entry of the file.
type publishedCheck struct {
	ID       string          `json:"id"`
	Inputs   json.RawMessage `json:"inputs"`
	Expected json.RawMessage `json:"expected"`
	Tol      json.RawMessage `json:"tol"`
	Source   string          `json:"source"`
}

// published gives the checks whose id begins with prefix; none is a failure.
func published(t *testing.T, prefix string) []publishedCheck {
	t.Helper()
	data, err := os.ReadFile("../testdata/published/checks.json")
	if err != nil {
		t.Fatal(err)
	}
	var file struct {
		Checks []publishedCheck `json:"checks"`
	}
	into(t, data, &file)
	var found []publishedCheck
	for _, c := range file.Checks {
		if strings.HasPrefix(c.ID, prefix) {
			found = append(found, c)
		}
	}
	if len(found) == 0 {
		t.Fatalf("no published check %q", prefix)
	}
	return found
}

// into decodes JSON; a failure ends the test.
func into(t *testing.T, data []byte, v any) {
	t.Helper()
	if err := json.Unmarshal(data, v); err != nil {
		t.Fatal(err)
	}
}

// near fails where got is further than tol from want.
func near(t *testing.T, what string, got, want, tol float64) {
	t.Helper()
	if !(math.Abs(got-want) <= tol) {
		t.Errorf("%s is %.8g, want %.8g within %.2g", what, got, want, tol)
	}
}

// nearRel is near with a tolerance relative to want.
func nearRel(t *testing.T, what string, got, want, tol float64) {
	t.Helper()
	near(t, what, got, want, tol*math.Abs(want))
}

// standardDay is the standard air at a geopotential height, m.
func standardDay(t *testing.T, h float64) Air {
	t.Helper()
	a, err := AirAtDensityAltitude(h)
	if err != nil {
		t.Fatal(err)
	}
	return a
}

// geopotential is the geopotential height of a geometric one, m, with the earth's radius of ISO 2533.
func geopotential(z float64) float64 { return 6356766 * z / (6356766 + z) }

func TestPublishedStandardAtmosphere(t *testing.T) {
	seen := 0
	for _, c := range published(t, "ISA-") {
		var in struct {
			Geometric    *float64 `json:"geometric_m"`
			Geopotential *float64 `json:"geopotential_m"`
			Foot         *float64 `json:"geopotential_ft"`
		}
		var want struct {
			T     *float64 `json:"T_K"`
			P     *float64 `json:"p_Pa"`
			Rho   *float64 `json:"rho_kgm3"`
			A     *float64 `json:"a_ms"`
			Sigma *float64 `json:"sigma"`
			Delta *float64 `json:"delta"`
			Theta *float64 `json:"theta"`
		}
		var tol struct {
			T      float64 `json:"T_K"`
			P      float64 `json:"p_Pa"`
			PRel   float64 `json:"p_rel"`
			RhoRel float64 `json:"rho_rel"`
			A      float64 `json:"a_ms"`
			Ratios float64 `json:"ratios"`
		}
		into(t, c.Inputs, &in)
		into(t, c.Expected, &want)
		into(t, c.Tol, &tol)
		var h float64
		switch {
		case c.ID == "ISA-ICAO-11019", c.ID == "ISA-ICAO-20063":
			h = math.Round(geopotential(*in.Geometric)/1000) * 1000 // the source's rows are at exactly 11 and 20 km geopotential
		case in.Geometric != nil:
			h = geopotential(*in.Geometric)
		case in.Geopotential != nil:
			h = *in.Geopotential
		case in.Foot != nil:
			h = *in.Foot * Foot
		default:
			continue
		}
		if h < -2000 || h > 20000+0.5 {
			continue
		}
		got := standardDay(t, min(h, 20000))
		seen++
		if want.T != nil {
			near(t, c.ID+" temperature", got.Temperature, *want.T, tol.T)
		}
		if want.P != nil {
			near(t, c.ID+" pressure", got.Pressure, *want.P, max(tol.P, tol.PRel**want.P, 0.05)) // five or six digits are printed
		}
		if want.Rho != nil {
			nearRel(t, c.ID+" density", got.Density, *want.Rho, tol.RhoRel)
		}
		if want.A != nil {
			near(t, c.ID+" speed of sound", got.SpeedOfSound, *want.A, tol.A)
		}
		if want.Sigma != nil {
			near(t, c.ID+" sigma", got.Density/SeaLevelDensity, *want.Sigma, tol.Ratios)
			near(t, c.ID+" delta", got.Pressure/SeaLevelPressure, *want.Delta, tol.Ratios)
			near(t, c.ID+" theta", got.Temperature/SeaLevelTemperature, *want.Theta, tol.Ratios)
		}
	}
	if seen < 40 {
		t.Errorf("only %d rows were checked", seen)
	}
}

func TestPublishedDensityAltitude(t *testing.T) {
	for _, c := range published(t, "ISA-dev-") {
		var in struct {
			PA float64 `json:"pressure_alt_ft"`
			DT float64 `json:"dT_C"`
		}
		var want struct {
			Rho float64 `json:"rho_kgm3"`
			DA  float64 `json:"density_alt_ft"`
		}
		into(t, c.Inputs, &in)
		into(t, c.Expected, &want)
		h := in.PA * Foot
		got, err := AirAt(h, StandardTemperature(h)+in.DT, 0)
		if err != nil {
			t.Fatal(err)
		}
		nearRel(t, c.ID+" density", got.Density, want.Rho, 2e-6)
		near(t, c.ID+" density altitude, ft", got.DensityAltitude/Foot, want.DA, 0.5)
	}
	published(t, "DA-PHAK-1")
	// The exact figures beside the chart's are 5718.09 and 7709.5 ft.
	a, err := AirAtField(5883*Foot, 30.10*InchMercury, ZeroCelsius+(70-32)/1.8, 0)
	if err != nil {
		t.Fatal(err)
	}
	near(t, "pressure altitude, ft", a.PressureAltitude/Foot, 5718, 1)
	near(t, "density altitude, ft", a.DensityAltitude/Foot, 7700, 100)
	near(t, "density altitude (exact), ft", a.DensityAltitude/Foot, 7709.5, 0.5)
	published(t, "PA-PHAK-2")
	a, err = AirAtField(0, 29.70*InchMercury, 288, 0)
	if err != nil {
		t.Fatal(err)
	}
	near(t, "pressure altitude, ft", a.PressureAltitude/Foot, 205, 1)
}

func TestPublishedVapourPressure(t *testing.T) {
	for _, c := range published(t, "ESAT-WMO-CIMO") {
		var in struct {
			T []float64 `json:"t_C"`
		}
		var want struct {
			ES []float64 `json:"es_hPa"`
		}
		into(t, c.Inputs, &in)
		into(t, c.Expected, &want)
		for i, x := range in.T {
			nearRel(t, c.ID, SaturationVapourPressure(ZeroCelsius+x)/Hectopascal, want.ES[i], 2e-6)
		}
	}
	// Humid density with the same formula. The rows of CIPM-2007 carry the compressibility, which an ideal gas leaves out: 2 to 6
	// parts in 10 000.
	for _, c := range published(t, "HUM-CIPM-") {
		var in struct {
			T, RH float64
			TC    float64 `json:"t_C"`
			P     float64 `json:"p_Pa"`
		}
		var want struct {
			CIPM  float64 `json:"rho_CIPM2007"`
			Ideal float64 `json:"rho_ideal_CIMO"`
			DA    float64 `json:"density_alt_humid_ft"`
		}
		into(t, c.Inputs, &in)
		into(t, c.Expected, &want)
		dew := 0.0
		if in.RH > 0 {
			dew = min(dewPointOf(in.RH*SaturationVapourPressure(ZeroCelsius+in.TC)), ZeroCelsius+in.TC)
		}
		// Pressure altitude of the row's pressure, in the troposphere of ISO 2533.
		pa := SeaLevelTemperature / 0.0065 * (1 - math.Pow(in.P/SeaLevelPressure, 287.05287*0.0065/StandardGravity))
		a, err := AirAt(pa, ZeroCelsius+in.TC, dew)
		if err != nil {
			t.Fatal(err)
		}
		nearRel(t, c.ID+" density", a.Density, want.Ideal, 2e-6)
		nearRel(t, c.ID+" density against CIPM-2007", a.Density, want.CIPM, 6e-4)
		near(t, c.ID+" density altitude, ft", a.DensityAltitude/Foot, want.DA, 0.5)
	}
	// ASHRAE Handbook Fundamentals 2017 ch. 1, eqs 26 and 28 (HUM-RHO-ASHRAE): 30 C, humidity ratio 0.02, 95461 Pa.
	published(t, "HUM-RHO-ASHRAE")
	pa := SeaLevelTemperature / 0.0065 * (1 - math.Pow(95461/SeaLevelPressure, 287.05287*0.0065/StandardGravity))
	a, err := AirAt(pa, 303.15, dewPointOf(0.02*95461/(0.621945+0.02)))
	if err != nil {
		t.Fatal(err)
	}
	nearRel(t, "HUM-RHO-ASHRAE density", a.Density, 1.08411986348219, 3e-4)
}

// dewPointOf inverts the WMO formula, K.
func dewPointOf(e float64) float64 {
	l := math.Log(e / 611.2)
	return ZeroCelsius + 243.12*l/(17.62-l)
}

func TestPublishedAirspeeds(t *testing.T) {
	// Indicator test table, calibrated airspeed in knots against inches of water at 1 atm = 407.51 inH2O (checks.json QC-KT-INH2O).
	published(t, "QC-KT-INH2O")
	for _, r := range [][2]float64{{40, 1.04}, {50, 1.63}, {60, 2.35}, {70, 3.20}, {80, 4.19}, {90, 5.31}, {100, 6.56}, {110, 7.94},
		{120, 9.47}, {130, 11.12}, {140, 12.92}, {150, 14.86}, {160, 16.94}, {180, 21.52}, {200, 26.68}, {250, 42.22}} {
		near(t, "impact pressure, inH2O", ImpactPressure(CAS(r[0]*Knot))/SeaLevelPressure*407.51, r[1], 0.0055)
	}
	// The classic EAS/CAS factors of the flight-performance textbooks, six heights of nine speeds.
	for _, c := range published(t, "FFACTOR-") {
		var in struct {
			PA  float64   `json:"pressure_alt_ft"`
			CAS []float64 `json:"cas_kt"`
		}
		var want struct {
			F []float64 `json:"eas_over_cas"`
		}
		into(t, c.Inputs, &in)
		into(t, c.Expected, &want)
		a := standardDay(t, in.PA*Foot)
		for i, kt := range in.CAS {
			v := CAS(kt * Knot)
			near(t, c.ID+" EAS/CAS", float64(a.EASFromTAS(a.TASFromCAS(v)))/float64(v), want.F[i], 0.0006)
		}
	}
	for _, r := range []struct{ cas, pa, oat, eas, tas float64 }{
		{100, 5000, math.NaN(), 99.9428, 107.6666}, {120, 8000, math.NaN(), 119.8314, 135.1620},
		{200, 20000, math.NaN(), 197.4718, 270.5318}, {100, 5000, 25, 99.9428, 111.4514}, {90, 3000, -5, 89.9760, 91.6841},
	} {
		temp := StandardTemperature(r.pa * Foot)
		if !math.IsNaN(r.oat) {
			temp = ZeroCelsius + r.oat
		}
		a, err := AirAt(r.pa*Foot, temp, 0)
		if err != nil {
			t.Fatal(err)
		}
		v := a.TASFromCAS(CAS(r.cas * Knot))
		near(t, "TAS, kt", float64(v)/Knot, r.tas, 1e-4)
		near(t, "EAS, kt", float64(a.EASFromTAS(v))/Knot, r.eas, 1e-4)
	}
}

// must gives a function that passes an air on or ends the test on its error.
func must(t *testing.T) func(Air, error) Air {
	return func(a Air, err error) Air {
		t.Helper()
		if err != nil {
			t.Fatal(err)
		}
		return a
	}
}
