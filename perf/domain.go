package perf

import "math"

// Quantity names one input of the model that has a domain. The table below is the single statement of what
// is physical: Validate, the case file, its schema and the screens all read it.
type Quantity uint8

// The inputs, in the order of the table.
const (
	QuantityWingArea Quantity = iota
	QuantityWingSpan
	QuantityEmptyMass
	QuantityMaximumMass
	QuantityParasiteDrag
	QuantityOswaldEfficiency
	QuantityLiftOfLeastDrag
	QuantityMaximumLift
	QuantityParasiteDragRise
	QuantityRatedPower
	QuantityRatedSpeed
	QuantityMaximumSpeed
	QuantityFullThrottleAltitude
	QuantityDropOffConstant
	QuantityLapseExponent
	QuantityThermalPower
	QuantitySpecificConsumption
	QuantityPropellerEfficiency
	QuantityDiameter
	QuantityBladeEfficiency
	QuantityPolarSlope
	QuantityPolarIntercept
	QuantityPowerCoefficientStatic
	QuantityPowerCoefficientSlope
	QuantityAdvanceRatio
	QuantityThrustCoefficient
	QuantityPowerCoefficient
	QuantityUsableFuel
	QuantityUsableEnergy
	QuantityPlacardSpeed
	QuantityPositionErrorIAS
	QuantityPositionErrorCorrection
	QuantityMass
	QuantityPressureAltitude
	QuantityTemperature
	QuantityDewPoint
	QuantityAltimeterSetting
	QuantityBank
	QuantityPowerFraction
	QuantityHeadwind
	QuantityFuel
	QuantityReserve
	QuantityClimbGradient
	quantityCount
)

// Domain is the closed range of values that the model takes for one input, in SI.
type Domain struct {
	Name     string  // the quantity in words, "wing area"
	Unit     string  // SI unit, "" for a ratio
	Min, Max float64 // inclusive
}

var domains = [quantityCount]Domain{
	QuantityWingArea:                {"wing area", "m^2", 0.5, 1000},
	QuantityWingSpan:                {"wing span", "m", 1, 100},
	QuantityEmptyMass:               {"empty mass", "kg", 5, 50000},
	QuantityMaximumMass:             {"maximum mass", "kg", 5, 50000},
	QuantityParasiteDrag:            {"parasite drag coefficient", "", 0.003, 0.5},
	QuantityOswaldEfficiency:        {"Oswald efficiency", "", 0.2, 1.2},
	QuantityLiftOfLeastDrag:         {"lift coefficient of least drag", "", -0.5, 1.5},
	QuantityMaximumLift:             {"maximum lift coefficient", "", 0.3, 6},
	QuantityParasiteDragRise:        {"rise of the parasite drag coefficient", "", -0.1, 0.5},
	QuantityRatedPower:              {"rated power", "W", 100, 5e6},
	QuantityRatedSpeed:              {"rated speed", "rev/s", 1, 1000},
	QuantityMaximumSpeed:            {"maximum speed", "rev/s", 1, 1000},
	QuantityFullThrottleAltitude:    {"full-throttle altitude", "m", 0, 15000},
	QuantityDropOffConstant:         {"drop-off constant", "", 0, 0.5},
	QuantityLapseExponent:           {"lapse exponent", "", 0, 2},
	QuantityThermalPower:            {"thermal power", "W", 100, 2e7},
	QuantitySpecificConsumption:     {"specific consumption", "kg/J", 0.05 / KilowattHour, 2 / KilowattHour},
	QuantityPropellerEfficiency:     {"propeller efficiency", "", 0.05, 1},
	QuantityDiameter:                {"propeller diameter", "m", 0.1, 6},
	QuantityBladeEfficiency:         {"blade efficiency", "", 0.05, 1},
	QuantityPolarSlope:              {"propeller polar slope", "", 0.1, 10},
	QuantityPolarIntercept:          {"propeller polar intercept", "", -1, -0.0001},
	QuantityPowerCoefficientStatic:  {"static power coefficient", "", 0.001, 1},
	QuantityPowerCoefficientSlope:   {"power coefficient slope", "", -1, 0},
	QuantityAdvanceRatio:            {"advance ratio", "", 0, 6},
	QuantityThrustCoefficient:       {"thrust coefficient", "", -0.5, 1},
	QuantityPowerCoefficient:        {"power coefficient", "", 0.0001, 2},
	QuantityUsableFuel:              {"usable fuel", "kg", 0, 20000},
	QuantityUsableEnergy:            {"usable energy", "J", 0, 1e4 * KilowattHour},
	QuantityPlacardSpeed:            {"placard speed", "m/s", 5, 250},
	QuantityPositionErrorIAS:        {"indicated airspeed", "m/s", 1, 300},
	QuantityPositionErrorCorrection: {"position error correction", "m/s", -30, 30},
	QuantityMass:                    {"mass", "kg", 5, 50000},
	QuantityPressureAltitude:        {"pressure altitude", "m", -2000, 20000},
	QuantityTemperature:             {"outside air temperature", "K", 173.15, 343.15},
	QuantityDewPoint:                {"dew point", "K", 173.15, 343.15},
	QuantityAltimeterSetting:        {"altimeter setting", "Pa", 80000, 110000},
	QuantityBank:                    {"bank", "rad", 0, 75 * Degree},
	QuantityPowerFraction:           {"power fraction", "", 0.01, 1},
	QuantityHeadwind:                {"headwind", "m/s", -100, 100},
	QuantityFuel:                    {"fuel", "kg", 0, 20000},
	QuantityReserve:                 {"reserve", "s", 0, 24 * Hour},
	QuantityClimbGradient:           {"climb gradient", "", 0, 1},
}

// Domain returns the range of q. It panics for a value that is no Quantity.
func (q Quantity) Domain() Domain { return domains[q] }

// Holds reports whether x is a finite number inside the domain.
func (d Domain) Holds(x float64) bool {
	return !math.IsNaN(x) && x >= d.Min && x <= d.Max
}
