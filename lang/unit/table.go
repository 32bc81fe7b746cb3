package unit

// The sources of the factors.
const (
	srcSI      = "BIPM, SI Brochure, 9th ed. (2019), tables 2 and 4"
	srcSI8     = "BIPM, SI Brochure, 9th ed. (2019), table 8 (non-SI units accepted with the SI)"
	srcSP811   = "NIST SP 811 (2008), appendix B.8"
	srcIEC     = "IEC 80000-6"
	srcGauss   = "NIST SP 811 (2008), appendix B.8; exact until 2018, since then conventional (to 1.6e-10)"
	srcCODATA  = "CODATA 2022"
	srcTrade   = "common practice"
	srcGoUnits = "NIST SP 811 (2008), appendix B.8; factor supplied by go-units and audited"
)

// row is one line of the table: factor num/den·10^exp·π^pi to the coherent SI
// unit of the dimension.
type row struct {
	symbol, name string
	also         string // further spellings, apart by blanks
	dim          Dim
	num, den     int64
	exp, pi      int
	prefix       prefixSet
	source       string
	measured     bool
}

// of makes a dimension of whole exponents of length, mass, time and current.
func of(l, m, t, i int) Dim {
	return Dim{Length: Whole(l), Mass: Whole(m), Time: Whole(t), Current: Whole(i)}
}

// with adds an exponent n of another index.
func with(d Dim, at, n int) Dim {
	d[at] = Whole(n)
	return d
}

// Dimensions that several rows share.
var (
	dimOne      = Dim{}
	dimLength   = of(1, 0, 0, 0)
	dimArea     = of(2, 0, 0, 0)
	dimVolume   = of(3, 0, 0, 0)
	dimMass     = of(0, 1, 0, 0)
	dimTime     = of(0, 0, 1, 0)
	dimCurrent  = of(0, 0, 0, 1)
	dimKelvin   = with(Dim{}, Temperature, 1)
	dimAngle    = with(Dim{}, Angle, 1)
	dimHertz    = with(of(0, 0, -1, 0), Cycle, 1)
	dimForce    = of(1, 1, -2, 0)
	dimPressure = of(-1, 1, -2, 0)
	dimEnergy   = of(2, 1, -2, 0)
	dimPower    = of(2, 1, -3, 0)
	dimCharge   = of(0, 0, 1, 1)
	dimVoltage  = of(2, 1, -3, -1)
	dimFlux     = of(2, 1, -2, -1)
	dimTesla    = of(0, 1, -2, -1)
	dimOersted  = of(-1, 0, 0, 1)
)

// rows is the table of units. Adding a unit is a line here.
var rows = [...]row{
	// Base and named derived units of the SI.
	{"m", "metre", "", dimLength, 1, 1, 0, 0, anyPrefix, srcSI, false},
	{"g", "gram", "", dimMass, 1, 1, -3, 0, anyPrefix, srcSI, false},
	{"s", "second", "", dimTime, 1, 1, 0, 0, anyPrefix, srcSI, false},
	{"A", "ampere", "", dimCurrent, 1, 1, 0, 0, anyPrefix, srcSI, false},
	{"K", "kelvin", "", dimKelvin, 1, 1, 0, 0, anyPrefix, srcSI, false},
	{"mol", "mole", "", with(Dim{}, Amount, 1), 1, 1, 0, 0, anyPrefix, srcSI, false},
	{"cd", "candela", "", with(Dim{}, Luminosity, 1), 1, 1, 0, 0, anyPrefix, srcSI, false},
	{"rad", "radian", "", dimAngle, 1, 1, 0, 0, anyPrefix, srcSI, false},
	{"sr", "steradian", "", with(Dim{}, Angle, 2), 1, 1, 0, 0, anyPrefix, srcSI, false},
	{"Hz", "hertz", "", dimHertz, 1, 1, 0, 0, anyPrefix, srcSI, false},
	{"N", "newton", "", dimForce, 1, 1, 0, 0, anyPrefix, srcSI, false},
	{"Pa", "pascal", "", dimPressure, 1, 1, 0, 0, anyPrefix, srcSI, false},
	{"J", "joule", "", dimEnergy, 1, 1, 0, 0, anyPrefix, srcSI, false},
	{"W", "watt", "", dimPower, 1, 1, 0, 0, anyPrefix, srcSI, false},
	{"C", "coulomb", "", dimCharge, 1, 1, 0, 0, anyPrefix, srcSI, false},
	{"V", "volt", "", dimVoltage, 1, 1, 0, 0, anyPrefix, srcSI, false},
	{"F", "farad", "", of(-2, -1, 4, 2), 1, 1, 0, 0, anyPrefix, srcSI, false},
	{"Ω", "ohm", "ohm \u2126", of(2, 1, -3, -2), 1, 1, 0, 0, anyPrefix, srcSI, false},
	{"S", "siemens", "", of(-2, -1, 3, 2), 1, 1, 0, 0, anyPrefix, srcSI, false},
	{"Wb", "weber", "", dimFlux, 1, 1, 0, 0, anyPrefix, srcSI, false},
	{"T", "tesla", "", dimTesla, 1, 1, 0, 0, anyPrefix, srcSI, false},
	{"H", "henry", "", of(2, 1, -2, -2), 1, 1, 0, 0, anyPrefix, srcSI, false},
	{"°C", "degree Celsius", "degC ℃", dimKelvin, 1, 1, 0, 0, noPrefix, srcSI, false},
	{"lm", "lumen", "", with(with(Dim{}, Luminosity, 1), Angle, 2), 1, 1, 0, 0, anyPrefix, srcSI, false},
	{"lx", "lux", "", with(with(of(-2, 0, 0, 0), Luminosity, 1), Angle, 2), 1, 1, 0, 0, anyPrefix, srcSI, false},
	{"Bq", "becquerel", "", of(0, 0, -1, 0), 1, 1, 0, 0, anyPrefix, srcSI, false},
	{"Gy", "gray", "", of(2, 0, -2, 0), 1, 1, 0, 0, anyPrefix, srcSI, false},
	{"Sv", "sievert", "", of(2, 0, -2, 0), 1, 1, 0, 0, anyPrefix, srcSI, false},
	{"kat", "katal", "", with(of(0, 0, -1, 0), Amount, 1), 1, 1, 0, 0, anyPrefix, srcSI, false},

	// Special names for the coherent unit of power in alternating current.
	{"VA", "volt ampere", "", dimPower, 1, 1, 0, 0, upKMG | downMUN, srcIEC, false},
	{"var", "var", "", dimPower, 1, 1, 0, 0, upKMG | downMUN, srcIEC, false},

	// Non-SI units accepted for use with the SI.
	{"min", "minute", "", dimTime, 60, 1, 0, 0, noPrefix, srcSI8, false},
	{"h", "hour", "", dimTime, 3600, 1, 0, 0, noPrefix, srcSI8, false},
	{"d", "day", "", dimTime, 86400, 1, 0, 0, noPrefix, srcSI8, false},
	{"au", "astronomical unit", "", dimLength, 149597870700, 1, 0, 0, noPrefix, srcSI8, false},
	{"°", "degree", "deg", dimAngle, 1, 180, 0, 1, noPrefix, srcSI8, false},
	{"′", "minute of arc", "' arcmin", dimAngle, 1, 10800, 0, 1, noPrefix, srcSI8, false},
	{"″", "second of arc", "'' arcsec", dimAngle, 1, 648000, 0, 1, noPrefix, srcSI8, false},
	{"ha", "hectare", "", dimArea, 1, 1, 4, 0, noPrefix, srcSI8, false},
	{"L", "litre", "l", dimVolume, 1, 1, -3, 0, anyPrefix, srcSI8, false},
	{"t", "tonne", "", dimMass, 1, 1, 3, 0, upKMG, srcSI8, false},
	{"Da", "dalton", "u", dimMass, 166053906892, 1, -38, 0, kiloMega, srcCODATA, true},
	{"eV", "electronvolt", "", dimEnergy, 1602176634, 1, -28, 0, anyPrefix, srcSI8, false},

	// Ratios, angles and rates of the trade.
	{"%", "per cent", "", dimOne, 1, 1, -2, 0, noPrefix, srcSP811, false},
	{"‰", "per mille", "", dimOne, 1, 1, -3, 0, noPrefix, srcTrade, false},
	{"ppm", "parts per million", "", dimOne, 1, 1, -6, 0, noPrefix, srcSP811, false},
	{"rpm", "revolution per minute", "", dimHertz, 1, 60, 0, 0, noPrefix, srcSP811, false},
	{"Wh", "watt hour", "", dimEnergy, 3600, 1, 0, 0, upKMG | downMUN, srcSP811, false},
	{"Ah", "ampere hour", "", dimCharge, 3600, 1, 0, 0, upKMG | downMUN, srcSP811, false},
	{"VAh", "volt ampere hour", "", dimEnergy, 3600, 1, 0, 0, upKMG, srcIEC, false},
	{"varh", "var hour", "", dimEnergy, 3600, 1, 0, 0, upKMG, srcIEC, false},

	// Length, area, mass, force: customary. A line without a factor has it from
	// go-units (customary.go).
	{"in", "inch", "", dimLength, 0, 0, 0, 0, noPrefix, srcGoUnits, false},
	{"ft", "foot", "", dimLength, 0, 0, 0, 0, noPrefix, srcGoUnits, false},
	{"yd", "yard", "", dimLength, 0, 0, 0, 0, noPrefix, srcGoUnits, false},
	{"mi", "mile", "", dimLength, 0, 0, 0, 0, noPrefix, srcGoUnits, false},
	{"oz", "ounce", "", dimMass, 0, 0, 0, 0, noPrefix, srcGoUnits, false},
	{"lb", "pound", "lbm", dimMass, 0, 0, 0, 0, noPrefix, srcGoUnits, false},
	{"mil", "mil (0.001 in)", "thou", dimLength, 254, 1, -7, 0, noPrefix, srcSP811, false},
	{"Å", "ångström", "\u212B A\u030A", dimLength, 0, 0, 0, 0, noPrefix, srcGoUnits, false},
	{"cmil", "circular mil", "", dimArea, 64516, 4, -14, 1, noPrefix, srcSP811, false},
	{"kcmil", "thousand circular mils", "", dimArea, 64516, 4, -11, 1, noPrefix, srcSP811, false},
	{"lbf", "pound-force", "", dimForce, 44482216152605, 1, -13, 0, noPrefix, srcSP811, false},
	{"ozf", "ounce-force", "", dimForce, 44482216152605, 16, -13, 0, noPrefix, srcSP811, false},
	{"dyn", "dyne", "", dimForce, 1, 1, -5, 0, noPrefix, srcSP811, false},

	// Pressure.
	{"bar", "bar", "", dimPressure, 1, 1, 5, 0, upKMG | downMUN, srcSP811, false},
	{"atm", "standard atmosphere", "", dimPressure, 101325, 1, 0, 0, noPrefix, srcSP811, false},
	{"Torr", "torr", "torr", dimPressure, 101325, 760, 0, 0, downMUN, srcSP811, false},
	{"mmHg", "conventional millimetre of mercury", "", dimPressure, 133322387415, 1, -9, 0, noPrefix, srcSP811, false},
	{"inHg", "conventional inch of mercury", "", dimPressure, 33863886403410, 1, -10, 0, noPrefix, srcSP811, false},
	{"psi", "pound-force per square inch", "", dimPressure, 44482216152605, 64516, -5, 0, noPrefix, srcSP811, false},
	{"ksi", "kilopound-force per square inch", "", dimPressure, 44482216152605, 64516, -2, 0, noPrefix, srcSP811, false},

	// Energy and power.
	{"erg", "erg", "", dimEnergy, 1, 1, -7, 0, noPrefix, srcSP811, false},
	{"cal", "calorie (thermochemical)", "", dimEnergy, 0, 0, 0, 0, kiloMega, srcGoUnits, false},
	{"cal_IT", "calorie (International Table)", "", dimEnergy, 41868, 1, -4, 0, kiloMega, srcSP811, false},
	{"BTU", "British thermal unit (International Table)", "Btu", dimEnergy, 105505585262, 1, -8, 0, noPrefix, srcSP811, false},
	{"hp", "horsepower (550 ft·lbf/s)", "", dimPower, 74569987158227022, 1, -14, 0, noPrefix, srcSP811, false},

	// Gaussian and electromagnetic CGS units, to their SI counterparts.
	{"G", "gauss", "", dimTesla, 1, 1, -4, 0, kiloMega | downMUN, srcSP811, false},
	{"Oe", "oersted", "", dimOersted, 1000, 4, 0, -1, kiloMega | downMUN, srcSP811, false},
	{"Mx", "maxwell", "", dimFlux, 1, 1, -8, 0, kiloMega, srcSP811, false},
	{"MGOe", "megagauss oersted", "", dimPressure, 1, 4, 5, -1, noPrefix, srcSP811, false},
	{"statC", "statcoulomb", "Fr esu", dimCharge, 1, 2997924580, 0, 0, noPrefix, srcGauss, true},
	{"statV", "statvolt", "", dimVoltage, 299792458, 1, -6, 0, noPrefix, srcGauss, true},
	{"statA", "statampere", "", dimCurrent, 1, 2997924580, 0, 0, noPrefix, srcGauss, true},
}
