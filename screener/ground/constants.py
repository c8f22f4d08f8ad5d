"""Physical constants and reference states; each with its source on its line."""

R = 8.31446261815324  # molar gas constant [J/(mol K)]; CODATA 2018, exact since the 2019 SI
STEFAN_BOLTZMANN = 5.670374419e-8  # [W/(m2 K4)]; CODATA 2018, exact
GRAVITY = 9.80665  # standard gravity [m/s2]; CGPM 1901, resolution 2
PSI = 0.45359237 * GRAVITY / 0.0254**2  # pound-force per square inch [Pa]; yard and pound agreement of 1959, exact
ATMOSPHERE = 101325.0  # standard atmosphere [Pa]; CGPM 1954, resolution 4
ZERO_CELSIUS = 273.15  # 0 degC [K]; SI Brochure, 9th edition, 2.3.1
T_15C = 288.15  # base temperature of ISO 5024 [K]
T_60F = 288.70555555555556  # 60 degF, base temperature of API MPMS 11.1 [K]; (60 + 459.67) / 1.8
T_100F = 310.92777777777775  # 100 degF = 37.8 degC, temperature of the Reid and DVPE tests [K]
T_NORMAL = 273.15  # normal cubic metre of air, 0 degC and 101,325 Pa; DIN 1343
MW_AIR = 0.0289652  # dry air [kg/mol]; Picard et al., Metrologia 45 (2008) 149, 28.96546 g/mol at 400 ppm CO2, rounded
