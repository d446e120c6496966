"""Exact and conventional constants, unit in the name, source above each."""

#: SI, 9th edition (2019): product of the Boltzmann and Avogadro constants.
GAS_CONSTANT_J_per_molK = 8.314462618

#: ISO 2533 and ISO 3977-2: standard pressure at sea level.
STANDARD_PRESSURE_kPa = 101.325

#: SI: zero of the Celsius scale.
ZERO_CELSIUS_K = 273.15

#: ISO 3977-2: ambient of gas-turbine ratings.
ISO_AMBIENT_degC = 15.0

#: ISO 3977-2: humidity of gas-turbine ratings.
ISO_HUMIDITY_frac = 0.60

#: ISO 6976: reference temperature of combustion used here, to which calorific values refer.
COMBUSTION_REFERENCE_K = 298.15

#: ISO 6976:2016: molar enthalpy of vaporisation of water at 25 degC (from memory).
WATER_VAPORISATION_kJ_per_mol = 44.013

#: Molar volume of an ideal gas at 0 degC and 101.325 kPa, from the constants above.
NORMAL_MOLAR_VOLUME_m3_per_kmol = 22.413969545

#: IUPAC abridged standard atomic masses.
ATOMIC_MASS_kg_per_kmol = {"C": 12.011, "H": 1.008, "O": 15.999, "N": 14.007, "Ar": 39.95}
