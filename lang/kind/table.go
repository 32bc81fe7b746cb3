package kind

// The kinds that rules and inference name. A kind that none of them names needs
// no constant: it is a line at the end of the table.
const (
	_ ID = iota
	ElectricCurrent
	ElectricCharge
	VolumicElectricCharge
	AreicElectricCharge
	LineicElectricCharge
	ElectricDipoleMoment
	ElectricPolarization
	ElectricCurrentDensity
	LineicElectricCurrent
	ElectricFieldStrength
	ElectricPotential
	Voltage
	ElectricFluxDensity
	ElectricFlux
	Capacitance
	DifferentialCapacitance
	EnergyEquivalentCapacitance
	ChargeEquivalentCapacitance
	LineicCapacitance
	Permittivity
	RelativePermittivity
	ElectricSusceptibility
	DielectricStrength
	MagneticFluxDensity
	MagneticFlux
	LinkedFlux
	MagneticMoment
	Magnetization
	MagneticPolarization
	MagneticFieldStrength
	Permeability
	RelativePermeability
	InitialPermeability
	AmplitudePermeability
	IncrementalPermeability
	EffectivePermeability
	Coercivity
	MagneticVectorPotential
	MagnetomotiveForce
	CurrentLinkage
	Reluctance
	Inductance
	MutualInductance
	LineicInductance
	Conductivity
	Resistivity
	Resistance
	Reactance
	Impedance
	Conductance
	Susceptance
	Admittance
	SurfaceResistance
	Energy
	SourceWork
	Coenergy
	ActiveEnergy
	EnergyDensity
	CoenergyDensity
	LineicEnergy
	AreicEnergy
	Power
	ApparentPower
	ComplexPower
	ReactivePower
	PowerDensity
	PowerFluxDensity
	LineicPower
	LineicReactivePower
	LineicCurrent
	SafetyFactor
	Utilisation
	Ratio
	Efficiency
	DutyRatio
	EquivalentRadiatedPower
	EIRP
	ERP
	SpecificAbsorptionRate
	SpecificPower
	LossFactor
	LossAngle
	PhaseDifference
	QualityFactor
	PowerFactor
	CouplingFactor
	LeakageFactor
	NumberOfTurns
	Frequency
	AngularFrequency
	Period
	Time
	TimeConstant
	Wavelength
	Length
	Thickness
	Radius
	SkinDepth
	Area
	Volume
	Angle
	SolidAngle
	PhaseSpeed
	GroupSpeed
	AttenuationCoefficient
	PhaseCoefficient
	PropagationCoefficient
	RefractiveIndex
	Stiffness
	HeatingRate
	Mass
	Density
	Force
	LineicForce
	Torque
	Pressure
	Temperature
	TemperatureRise
	ThermalConductivity
	ThermalResistance
	SpecificHeatCapacity
	Heat
	PowerRatio
	AmplitudeRatio
	MagneticSusceptibility
	DisplacementCurrent
	DisplacementCurrentDensity
	Permeance
	Speed
	RatedVoltage
	IncrementalInductance
	ReversiblePermeability
	ComplexPermeability
	SaturationFluxDensity
	KneeFluxDensity
	SaturationCurrent
	RemanentFluxDensity
	RemanentPolarization
	EnergyProduct
	RecoverableEnergy
	RecoverableEnergyDensity
	AirGap
	OpticAxis
	Impermittivity
	RelativeImpermittivity
	CrestFactor
	LineToLineVoltage
	LineToEarthVoltage
	EarthFaultFactor
	WithstandVoltage
	BreakdownVoltage
	InceptionVoltage
	InceptionFieldStrength
	IncidentFieldStrength
	PeakEnvelopePower
	PulseDuration
	PulseRepetitionFrequency
	Reaction
	TransientThermalImpedance
	HeatFlowRate
	PolarizationLossFactor
	DCConductivity
	TotalLossFactor
	LossIndex
	PolarizationLossIndex
	EffectiveConductivity
	AngularWavenumber
	MeanFreePath
	SurfaceRoughness
	RequiredSafetyFactor
	DemagnetizingFactor
	RelativeTolerance
	ExternalPotential
	PermanentElectricDipoleMoment
	InducedElectricDipoleMoment
	Polarizability
	InteractionEnergy
	VacuumEnergyDensity
	CapacitanceCoefficient
	PartialCapacitance
	InternalEnergy
	InternalEnergyDensity
	ConstantStressPermittivity
	ConstantStrainPermittivity
	MechanicalResonanceFrequency
	TangentialFieldStrength
	NormalFieldStrength
	ChargingHeat
	PermanentMagneticMoment
	InducedMagneticMoment
	VacuumEnergy
)

// table is every kind. Fields: name (ISO/IEC 80000), further names, symbol,
// coherent SI unit, class, the kind that it specializes, plain (the one
// plausible kind of its dimension).
var table = [...]Kind{
	// IEC 80000-6: charges, currents, electric field.
	ElectricCurrent:             {"electric current", "current", "I", "A", ClassAmplitude, 0, false},
	ElectricCharge:              {"electric charge", "charge", "Q", "C", ClassAmplitude, 0, true},
	VolumicElectricCharge:       {"volumic electric charge", "charge density; volume charge density; electric charge density", "ρ", "C/m^3", ClassAmplitude, 0, true},
	AreicElectricCharge:         {"areic electric charge", "surface charge density; surface density of electric charge", "σ", "C/m^2", ClassAmplitude, 0, false},
	LineicElectricCharge:        {"lineic electric charge", "line charge density; linear density of electric charge", "τ", "C/m", ClassAmplitude, 0, true},
	ElectricDipoleMoment:        {"electric dipole moment", "", "p", "C·m", ClassAmplitude, 0, true},
	ElectricPolarization:        {"electric polarization", "polarization; electric polarisation; polarisation", "P", "C/m^2", ClassAmplitude, 0, false},
	ElectricCurrentDensity:      {"electric current density", "current density; areic electric current", "J", "A/m^2", ClassAmplitude, 0, true},
	LineicElectricCurrent:       {"lineic electric current", "surface current density; linear electric current density", "J_S", "A/m", ClassAmplitude, 0, false},
	ElectricFieldStrength:       {"electric field strength", "electric field; electric field intensity", "E", "V/m", ClassAmplitude, 0, true},
	ElectricPotential:           {"electric potential", "potential", "φ", "V", ClassAmplitude, 0, false},
	Voltage:                     {"voltage", "potential difference; electric potential difference; electric tension", "U", "V", ClassAmplitude, 0, false},
	ElectricFluxDensity:         {"electric flux density", "electric displacement", "D", "C/m^2", ClassAmplitude, 0, false},
	ElectricFlux:                {"electric flux", "", "Ψ", "C", ClassAmplitude, 0, false},
	Capacitance:                 {"capacitance", "", "C", "F", ClassOther, 0, true},
	DifferentialCapacitance:     {"differential capacitance", "small-signal capacitance; incremental capacitance", "C_d", "F", ClassOther, Capacitance, false},
	EnergyEquivalentCapacitance: {"energy-equivalent capacitance", "", "C", "F", ClassOther, Capacitance, false},
	ChargeEquivalentCapacitance: {"charge-equivalent capacitance", "", "C", "F", ClassOther, Capacitance, false},
	LineicCapacitance:           {"lineic capacitance", "capacitance per length", "C′", "F/m", ClassOther, 0, false},
	Permittivity:                {"permittivity", "", "ε", "F/m", ClassOther, 0, false},
	RelativePermittivity:        {"relative permittivity", "dielectric constant", "ε_r", "1", ClassOther, 0, false},
	ElectricSusceptibility:      {"electric susceptibility", "", "χ", "1", ClassOther, 0, false},
	DielectricStrength:          {"dielectric strength", "breakdown strength", "E_bd", "V/m", ClassAmplitude, ElectricFieldStrength, false},

	// Magnetic field.
	MagneticFluxDensity:     {"magnetic flux density", "magnetic induction", "B", "T", ClassAmplitude, 0, false},
	MagneticFlux:            {"magnetic flux", "", "Φ", "Wb", ClassAmplitude, 0, false},
	LinkedFlux:              {"linked flux", "", "Ψ", "Wb", ClassAmplitude, 0, false},
	MagneticMoment:          {"magnetic moment", "magnetic area moment", "m", "A·m^2", ClassAmplitude, 0, true},
	Magnetization:           {"magnetization", "magnetisation", "M", "A/m", ClassAmplitude, 0, false},
	MagneticPolarization:    {"magnetic polarization", "magnetic polarisation", "J_m", "T", ClassAmplitude, 0, false},
	MagneticFieldStrength:   {"magnetic field strength", "magnetic field; magnetizing field; magnetic field intensity", "H", "A/m", ClassAmplitude, 0, false},
	Permeability:            {"permeability", "", "μ", "H/m", ClassOther, 0, false},
	RelativePermeability:    {"relative permeability", "", "μ_r", "1", ClassOther, 0, false},
	InitialPermeability:     {"initial permeability", "", "μ_i", "1", ClassOther, RelativePermeability, false},
	AmplitudePermeability:   {"amplitude permeability", "", "μ_a", "1", ClassOther, RelativePermeability, false},
	IncrementalPermeability: {"incremental permeability", "", "μ_Δ", "1", ClassOther, RelativePermeability, false},
	EffectivePermeability:   {"effective permeability", "", "μ_e", "1", ClassOther, RelativePermeability, false},
	Coercivity:              {"coercivity", "", "H_c", "A/m", ClassAmplitude, 0, false},
	MagneticVectorPotential: {"magnetic vector potential", "", "A", "Wb/m", ClassAmplitude, 0, true},
	MagnetomotiveForce:      {"magnetomotive force", "", "F_m", "A", ClassAmplitude, 0, false},
	CurrentLinkage:          {"current linkage", "", "Θ", "A", ClassAmplitude, 0, false},
	Reluctance:              {"reluctance", "", "R_m", "H^-1", ClassOther, 0, true},
	Inductance:              {"inductance", "self inductance; self-inductance", "L", "H", ClassOther, 0, true},
	MutualInductance:        {"mutual inductance", "", "M", "H", ClassOther, Inductance, false},
	LineicInductance:        {"lineic inductance", "inductance per length", "L′", "H/m", ClassOther, 0, false},

	// Conduction and networks.
	Conductivity:      {"conductivity", "", "σ", "S/m", ClassOther, 0, true},
	Resistivity:       {"resistivity", "", "ρ", "Ω·m", ClassOther, 0, true},
	Resistance:        {"resistance", "", "R", "Ω", ClassOther, 0, false},
	Reactance:         {"reactance", "", "X", "Ω", ClassOther, 0, false},
	Impedance:         {"impedance", "complex impedance", "Z", "Ω", ClassOther, 0, false},
	Conductance:       {"conductance", "", "G", "S", ClassOther, 0, false},
	Susceptance:       {"susceptance", "", "B", "S", ClassOther, 0, false},
	Admittance:        {"admittance", "complex admittance", "Y", "S", ClassOther, 0, false},
	SurfaceResistance: {"surface resistance", "", "R_s", "Ω", ClassOther, 0, false},

	// Energy and power.
	Energy:                  {"energy", "work; stored energy; electromagnetic energy", "W", "J", ClassEnergy, 0, false},
	SourceWork:              {"source work", "energy drawn from a source", "W_s", "J", ClassSourceWork, Energy, false},
	Coenergy:                {"coenergy", "", "W′", "J", ClassEnergy, 0, false},
	ActiveEnergy:            {"active energy", "", "W", "J", ClassPower, Energy, false},
	EnergyDensity:           {"energy density", "volumic electromagnetic energy; electromagnetic energy density", "w", "J/m^3", ClassEnergy, 0, false},
	CoenergyDensity:         {"coenergy density", "", "w′", "J/m^3", ClassEnergy, 0, false},
	LineicEnergy:            {"lineic energy", "energy per length", "W′", "J/m", ClassEnergy, 0, false},
	AreicEnergy:             {"areic energy", "energy per area", "W″", "J/m^2", ClassEnergy, 0, false},
	Power:                   {"power", "active power; electric power", "P", "W", ClassPower, 0, false},
	ApparentPower:           {"apparent power", "", "S", "V·A", ClassPower, 0, false},
	ComplexPower:            {"complex power", "", "S", "V·A", ClassPower, 0, false},
	ReactivePower:           {"reactive power", "", "Q", "var", ClassPower, 0, false},
	PowerDensity:            {"power density", "volumic power; Joule heating", "p", "W/m^3", ClassPower, 0, true},
	PowerFluxDensity:        {"power flux density", "Poynting vector; irradiance", "S", "W/m^2", ClassPowerFlux, 0, true},
	LineicPower:             {"lineic power", "loss per length", "P′", "W/m", ClassPower, 0, false},
	LineicReactivePower:     {"lineic reactive power", "charging power; charging power per length", "Q′", "var/m", ClassPower, 0, false},
	LineicCurrent:           {"lineic current", "charging current per length; charging current", "I′", "A/m", ClassAmplitude, 0, false},
	EquivalentRadiatedPower: {"equivalent radiated power", "", "P_e", "W", ClassPower, 0, false},
	EIRP:                    {"equivalent isotropically radiated power", "EIRP", "P_i", "W", ClassPower, EquivalentRadiatedPower, false},
	ERP:                     {"effective radiated power", "ERP", "P_d", "W", ClassPower, EquivalentRadiatedPower, false},
	SpecificAbsorptionRate:  {"specific absorption rate", "SAR", "SAR", "W/kg", ClassPower, 0, false},
	SpecificPower:           {"specific power", "core loss per mass", "p_m", "W/kg", ClassPower, 0, false},

	// Ratios.
	SafetyFactor:    {"safety factor", "", "S", "1", ClassOther, 0, false},
	Utilisation:     {"utilisation", "utilization", "u", "1", ClassOther, 0, false},
	Ratio:           {"ratio", "gain; margin; level difference", "k", "1", ClassOther, 0, false},
	Efficiency:      {"efficiency", "", "η", "1", ClassPower, 0, false},
	DutyRatio:       {"duty ratio", "duty cycle; duty factor", "D", "1", ClassOther, 0, false},
	LossFactor:      {"loss factor", "loss tangent; dissipation factor", "d", "1", ClassOther, 0, false},
	LossAngle:       {"loss angle", "", "δ", "rad", ClassOther, Angle, false},
	PhaseDifference: {"phase difference", "", "φ", "rad", ClassOther, Angle, false},
	QualityFactor:   {"quality factor", "", "Q", "1", ClassOther, 0, false},
	PowerFactor:     {"power factor", "", "λ", "1", ClassOther, 0, false},
	CouplingFactor:  {"coupling factor", "", "k", "1", ClassOther, 0, false},
	LeakageFactor:   {"leakage factor", "", "σ", "1", ClassOther, 0, false},
	NumberOfTurns:   {"number of turns", "number of turns in a winding", "N", "1", ClassOther, 0, false},

	// ISO 80000-3: space and time; waves.
	Frequency:              {"frequency", "", "f", "Hz", ClassOther, 0, true},
	AngularFrequency:       {"angular frequency", "", "ω", "rad/s", ClassOther, 0, true},
	Period:                 {"period", "period duration", "T", "s", ClassOther, Time, false},
	Time:                   {"time", "duration", "t", "s", ClassOther, 0, true},
	TimeConstant:           {"time constant", "", "τ", "s", ClassOther, Time, false},
	Wavelength:             {"wavelength", "", "λ", "m", ClassOther, Length, false},
	Length:                 {"length", "", "l", "m", ClassOther, 0, true},
	Thickness:              {"thickness", "", "d", "m", ClassOther, Length, false},
	Radius:                 {"radius", "", "r", "m", ClassOther, Length, false},
	SkinDepth:              {"skin depth", "penetration depth", "δ", "m", ClassOther, Length, false},
	Area:                   {"area", "", "A", "m^2", ClassOther, 0, true},
	Volume:                 {"volume", "", "V", "m^3", ClassOther, 0, true},
	Angle:                  {"angle", "plane angle", "α", "rad", ClassOther, 0, true},
	SolidAngle:             {"solid angle", "", "Ω", "sr", ClassOther, 0, true},
	PhaseSpeed:             {"phase speed", "phase velocity; phase speed of electromagnetic waves", "c", "m/s", ClassOther, Speed, false},
	GroupSpeed:             {"group speed", "group velocity", "c_g", "m/s", ClassOther, Speed, false},
	AttenuationCoefficient: {"attenuation coefficient", "attenuation constant", "α", "m^-1", ClassOther, 0, false},
	PhaseCoefficient:       {"phase coefficient", "phase constant", "β", "m^-1", ClassOther, 0, false},
	PropagationCoefficient: {"propagation coefficient", "propagation constant", "γ", "m^-1", ClassOther, 0, false},
	RefractiveIndex:        {"refractive index", "", "n", "1", ClassOther, 0, false},

	// ISO 80000-4 and -5: mechanics, heat.
	Stiffness:            {"stiffness", "", "k", "N/m", ClassOther, 0, false},
	HeatingRate:          {"heating rate", "", "q", "K/s", ClassOther, 0, true},
	Mass:                 {"mass", "", "m", "kg", ClassOther, 0, true},
	Density:              {"density", "mass density", "ρ", "kg/m^3", ClassOther, 0, true},
	Force:                {"force", "", "F", "N", ClassForce, 0, false},
	LineicForce:          {"lineic force", "force per length", "F′", "N/m", ClassForce, 0, false},
	Torque:               {"torque", "moment of force", "T", "N·m", ClassForce, 0, false},
	Pressure:             {"pressure", "stress; electrostatic pressure; magnetic pressure", "p", "Pa", ClassForce, 0, false},
	Temperature:          {"temperature", "thermodynamic temperature; absolute temperature", "T", "K", ClassOther, 0, false},
	TemperatureRise:      {"temperature rise", "temperature difference", "ΔT", "K", ClassOther, 0, false},
	ThermalConductivity:  {"thermal conductivity", "", "λ", "W/(m·K)", ClassOther, 0, true},
	ThermalResistance:    {"thermal resistance", "", "R_th", "K/W", ClassOther, 0, true},
	SpecificHeatCapacity: {"specific heat capacity", "", "c", "J/(kg·K)", ClassOther, 0, true},
	Heat:                 {"heat", "", "Q", "J", ClassPower, Energy, false},

	// Further kinds of ISO/IEC 80000 that notes use; the two ratios decide
	// between 10 and 20 lg where `ratio` leaves it open.
	PowerRatio:                 {"power ratio", "power gain; antenna gain; directivity", "G", "1", ClassPower, Ratio, false},
	AmplitudeRatio:             {"amplitude ratio", "voltage ratio; current ratio; field ratio; voltage gain", "A", "1", ClassAmplitude, Ratio, false},
	MagneticSusceptibility:     {"magnetic susceptibility", "", "χ_m", "1", ClassOther, 0, false},
	DisplacementCurrent:        {"displacement current", "", "I_D", "A", ClassAmplitude, ElectricCurrent, false},
	DisplacementCurrentDensity: {"displacement current density", "", "J_D", "A/m^2", ClassAmplitude, ElectricCurrentDensity, false},
	Permeance:                  {"permeance", "", "Λ", "H", ClassOther, 0, false},
	Speed:                      {"speed", "velocity", "v", "m/s", ClassOther, 0, true},

	// What a medium or a part is good for up to a point: rated values (IEC 60050-151),
	// saturation, knee and remanence, types of permeability, the air gap
	// (IEC 60050-221), differential values of curved characteristics.
	RatedVoltage:             {"rated voltage", "", "U_R", "V", ClassAmplitude, Voltage, false},
	IncrementalInductance:    {"incremental inductance", "differential inductance; small-signal inductance", "L_Δ", "H", ClassOther, Inductance, false},
	ReversiblePermeability:   {"reversible permeability", "", "μ_rev", "1", ClassOther, RelativePermeability, false},
	ComplexPermeability:      {"complex permeability", "", "μ_c", "1", ClassOther, RelativePermeability, false},
	SaturationFluxDensity:    {"saturation flux density", "saturation magnetic flux density; saturation induction", "B_sat", "T", ClassAmplitude, MagneticFluxDensity, false},
	KneeFluxDensity:          {"flux density at the knee", "knee of the magnetization curve", "B_k", "T", ClassAmplitude, MagneticFluxDensity, false},
	SaturationCurrent:        {"saturation current", "", "I_sat", "A", ClassAmplitude, ElectricCurrent, false},
	RemanentFluxDensity:      {"remanent flux density", "remanence; remanent magnetic flux density", "B_r", "T", ClassAmplitude, MagneticFluxDensity, false},
	RemanentPolarization:     {"remanent polarization", "remanent polarisation", "P_r", "C/m^2", ClassAmplitude, ElectricPolarization, false},
	EnergyProduct:            {"energy product", "maximum energy product; BH product; maximum BH product", "(BH)_max", "J/m^3", ClassOther, 0, false},
	RecoverableEnergy:        {"recoverable energy", "delivered energy; discharge energy", "W_rec", "J", ClassEnergy, Energy, false},
	RecoverableEnergyDensity: {"recoverable energy density", "delivered energy density; discharge energy density", "w_rec", "J/m^3", ClassEnergy, EnergyDensity, false},
	AirGap:                   {"air gap", "gap length; length of the air gap", "g", "m", ClassOther, Length, false},

	// Crystals: the direction of the optic axis in the frame in which the note
	// writes its vectors, and the inverse of the permittivity.
	OpticAxis:              {"optic axis", "direction of the optic axis", "c", "1", ClassOther, 0, false},
	Impermittivity:         {"impermittivity", "reciprocal permittivity", "β", "m/F", ClassOther, 0, true},
	RelativeImpermittivity: {"relative impermittivity", "relative dielectric impermeability", "B", "1", ClassOther, 0, false},

	// What the statistics of alternating and pulsed quantities hang on: crest
	// factor, three-phase voltages (IEC 60050-601; the earth fault factor,
	// IEC 60050-614), levels of insulation (IEC 60071-1, IEC 60270), the field
	// that falls on a body, pulses (IEC 60050-702), the product of two phasors
	// without a conjugate.
	CrestFactor:               {"crest factor", "peak factor", "k_c", "1", ClassAmplitude, AmplitudeRatio, false},
	LineToLineVoltage:         {"line-to-line voltage", "phase-to-phase voltage; system voltage; nominal voltage of a system; highest voltage for equipment", "U_LL", "V", ClassAmplitude, Voltage, false},
	LineToEarthVoltage:        {"line-to-earth voltage", "phase-to-earth voltage; line-to-ground voltage; line-to-neutral voltage; phase-to-neutral voltage", "U_LE", "V", ClassAmplitude, Voltage, false},
	EarthFaultFactor:          {"earth fault factor", "earth-fault factor", "k", "1", ClassOther, 0, false},
	WithstandVoltage:          {"withstand voltage", "rated withstand voltage", "U_w", "V", ClassAmplitude, Voltage, false},
	BreakdownVoltage:          {"breakdown voltage", "disruptive discharge voltage; flashover voltage; sparkover voltage", "U_bd", "V", ClassAmplitude, Voltage, false},
	InceptionVoltage:          {"inception voltage", "partial discharge inception voltage", "U_i", "V", ClassAmplitude, Voltage, false},
	InceptionFieldStrength:    {"inception field strength", "partial discharge inception field strength", "E_i", "V/m", ClassAmplitude, ElectricFieldStrength, false},
	IncidentFieldStrength:     {"incident electric field strength", "incident field strength; external electric field strength; unperturbed electric field strength", "E_inc", "V/m", ClassAmplitude, ElectricFieldStrength, false},
	PeakEnvelopePower:         {"peak envelope power", "PEP; pulse power", "P_p", "W", ClassPower, Power, false},
	HeatFlowRate:              {"heat flow rate", "", "Φ", "W", ClassPower, Power, false},
	PulseDuration:             {"pulse duration", "pulse width; pulse length", "t_p", "s", ClassOther, Time, false},
	PulseRepetitionFrequency:  {"pulse repetition frequency", "pulse repetition rate; repetition frequency; repetition rate", "f_p", "Hz", ClassOther, Frequency, false},
	TransientThermalImpedance: {"transient thermal impedance", "", "Z_th", "K/W", ClassOther, 0, false},
	Reaction:                  {"reaction", "reaction integral", "⟨a,b⟩", "W", ClassOther, 0, false},

	// What a loss is made of; charges and dipoles in a field that others make
	// (IEC 60050-121).
	PolarizationLossFactor:        {"polarization loss factor", "polarization loss tangent; dipolar loss factor", "tan δ_p", "1", ClassOther, LossFactor, false},
	DCConductivity:                {"direct-current conductivity", "dc conductivity; ionic conductivity", "σ_dc", "S/m", ClassOther, Conductivity, false},
	ExternalPotential:             {"external electric potential", "external potential; applied potential", "V_ext", "V", ClassAmplitude, ElectricPotential, false},
	PermanentElectricDipoleMoment: {"permanent electric dipole moment", "permanent dipole moment", "p_0", "C·m", ClassOther, ElectricDipoleMoment, false},
	InducedElectricDipoleMoment:   {"induced electric dipole moment", "induced dipole moment", "p_i", "C·m", ClassOther, ElectricDipoleMoment, false},
	Polarizability:                {"polarizability", "electric polarizability", "α", "C·m^2/V", ClassOther, 0, false},
	InteractionEnergy:             {"interaction energy", "energy in an external field", "W_i", "J", ClassEnergy, Energy, false},

	// A loss as a measurement at one frequency gives it, conduction included, and
	// the imaginary part ε″ of a relative permittivity (IEC 62631-2-1; effective
	// conductivity σ + ωε″: von Hippel; both from memory).
	TotalLossFactor:       {"total loss factor", "total loss tangent; measured loss factor", "tan δ", "1", ClassOther, LossFactor, false},
	LossIndex:             {"loss index", "dielectric loss index; relative loss index", "ε_r″", "1", ClassOther, 0, false},
	PolarizationLossIndex: {"polarization loss index", "dipolar loss index", "ε_p″", "1", ClassOther, LossIndex, false},
	EffectiveConductivity: {"effective conductivity", "total conductivity; equivalent conductivity", "σ_eff", "S/m", ClassOther, Conductivity, false},

	// Waves and surfaces: k = β − jα (ISO 80000-3), the mean free path of the
	// carriers, the rms height of a surface; what a design rule asks for; the
	// factor N of H = −N·M; a tolerance as a fraction.
	AngularWavenumber:    {"angular wavenumber", "angular repetency; complex wavenumber", "k", "m^-1", ClassOther, 0, false},
	MeanFreePath:         {"mean free path", "mean free path of electrons", "l_e", "m", ClassOther, Length, false},
	SurfaceRoughness:     {"surface roughness", "roughness; roughness height", "R_q", "m", ClassOther, Length, false},
	RequiredSafetyFactor: {"required safety factor", "minimum safety factor", "S_req", "1", ClassOther, SafetyFactor, false},
	DemagnetizingFactor:  {"demagnetizing factor", "demagnetization factor", "N", "1", ClassOther, 0, false},
	RelativeTolerance:    {"relative tolerance", "tolerance; relative deviation", "t", "1", ClassOther, Ratio, false},

	VacuumEnergyDensity: {"vacuum energy density", "energy density of the field alone; vacuum part of the energy density", "w_0", "J/m^3", ClassEnergy, EnergyDensity, false},

	// Capacitances of several conductors: Q_i = Σ C_ij·V_j with C_ij ≤ 0 for
	// i ≠ j, and the capacitors of the equivalent network (names of textbooks on
	// Maxwell's coefficients).
	CapacitanceCoefficient: {"capacitance coefficient", "coefficient of electrostatic induction; short-circuit capacitance", "C_ij", "F", ClassOther, Capacitance, false},
	PartialCapacitance:     {"partial capacitance", "two-terminal capacitance; mutual capacitance", "c_ij", "F", ClassOther, Capacitance, false},
	// What a constant holds for: heat in it or not, mechanically free or clamped
	// (IEC 60050-121 and IEEE 176-1987, 2.3: constants at constant stress T and
	// constant strain S; from memory).
	InternalEnergy:               {"internal energy", "calorimetric energy", "U", "J", ClassEnergy, Energy, false},
	InternalEnergyDensity:        {"internal energy density", "volumic internal energy", "u", "J/m^3", ClassEnergy, EnergyDensity, false},
	ConstantStressPermittivity:   {"constant-stress relative permittivity", "free relative permittivity; unclamped relative permittivity", "ε_r^T", "1", ClassOther, RelativePermittivity, false},
	ConstantStrainPermittivity:   {"constant-strain relative permittivity", "clamped relative permittivity", "ε_r^S", "1", ClassOther, RelativePermittivity, false},
	MechanicalResonanceFrequency: {"mechanical resonance frequency", "mechanical resonance", "f_m", "Hz", ClassOther, Frequency, false},

	// Components at a boundary: the tangential one of E is continuous.
	TangentialFieldStrength: {"tangential electric field strength", "tangential component of the electric field strength", "E_t", "V/m", ClassAmplitude, ElectricFieldStrength, false},
	NormalFieldStrength:     {"normal electric field strength", "normal component of the electric field strength", "E_n", "V/m", ClassAmplitude, ElectricFieldStrength, false},

	// What becomes heat in the circuit while a store is filled.
	ChargingHeat: {"charging heat", "heat of charging", "Q_ch", "J", ClassOther, Heat, false},

	// Moments in a field that others make, as for electric dipoles.
	PermanentMagneticMoment: {"permanent magnetic moment", "", "m_0", "A·m^2", ClassOther, MagneticMoment, false},
	InducedMagneticMoment:   {"induced magnetic moment", "", "m_i", "A·m^2", ClassOther, MagneticMoment, false},

	VacuumEnergy: {"vacuum energy", "energy of the field alone; vacuum part of the energy", "W_0", "J", ClassEnergy, Energy, false},

	// Kinds that no rule names: a line is enough.
	{"total current", "", "I_t", "A", ClassAmplitude, ElectricCurrent, false},
	{"total current density", "", "J_t", "A/m^2", ClassAmplitude, ElectricCurrentDensity, false},
	{"magnetic dipole moment", "", "j_m", "Wb·m", ClassAmplitude, 0, true},
	{"source voltage", "source tension; electromotive force", "U_s", "V", ClassAmplitude, Voltage, false},
	{"scalar magnetic potential", "", "V_m", "A", ClassAmplitude, 0, false},
	{"magnetic tension", "", "U_m", "A", ClassAmplitude, 0, false},
	{"non-active power", "", "Q′", "V·A", ClassPower, 0, false},
	{"resistance to alternating current", "ac resistance", "R", "Ω", ClassOther, Resistance, false},
	{"wave impedance", "characteristic impedance", "Z", "Ω", ClassOther, Impedance, false},
	{"reflection coefficient", "", "Γ", "1", ClassAmplitude, Ratio, false},
	{"transmission coefficient", "", "T", "1", ClassAmplitude, Ratio, false},
	{"antenna factor", "", "AF", "m^-1", ClassAmplitude, 0, false},
	{"effective area", "", "A_e", "m^2", ClassOther, Area, false},
	{"acceleration", "", "a", "m/s^2", ClassOther, 0, true},
	{"coefficient of heat transfer", "heat transfer coefficient", "h", "W/(m^2·K)", ClassOther, 0, true},
	{"heat capacity", "", "C", "J/K", ClassOther, 0, true},
}
