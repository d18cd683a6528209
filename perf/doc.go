// Package perf computes how slow and how fast a light propeller aeroplane can hold level flight, what sets each end, and the other speeds,
// ceilings and turns that its figures give. It has no files, clock, goroutines or screen; SI inside, always.
//
//	symbol  quantity                                   unit
//	S, b    wing area, wing span                       m^2, m
//	A, e    aspect ratio b^2/S, Oswald efficiency
//	cd0     parasite drag coefficient (with the rise of the configuration)
//	k       1/(pi A e)
//	CL      lift coefficient n W/(q S); CLmd that of least drag
//	CD      cd0 + k (CL - CLmd)^2
//	W, n    weight m g, load factor 1/cos(bank)        N
//	V       true airspeed                              m/s
//	rho, q  density, dynamic pressure rho V^2/2        kg/m^3, Pa
//	sigma   rho/rho0
//	D, T    drag, thrust                               N
//	a, b, c D = a V^2 - b + c/V^2 at one mass, load factor and density
//	P       shaft power                                W
//	phi     full-throttle power over rated power
//	c       drop-off constant of Gagg and Ferrar
//	eta     propeller efficiency; kappa that of the blades
//	w, u    velocity induced at the disc, u = V + w    m/s
//	Q, n    torque, rpm                                N m, rev/s
//	J       advance ratio V/(n D), D the diameter      (D in m)
//	CT, CP  T/(rho n^2 D^4), P/(rho n^3 D^5)
//	m, b    slope and intercept of the linear propeller polar CT/J^2 = m CP/J^2 + b
//	cp0,cp1 CP = cp0 + cp1 J^2
//
// Quasi-steady and small angles throughout: lift is n W, the rate of climb (T - D) V/W, the gradient (T - D)/W. Speeds for climb, range and
// endurance are sought at or above the stall; where the optimum lies below, the stall is the answer and SetByLift says so.
//
// # Level flight
//
// The band of level flight is the stretch of speeds at or above the stall where the thrust at the power asked for, the rpm held to its maximum
// where one is given, is at least the drag; if there are several, the one with the greatest excess thrust. Its slow end is set by
// lift, power or rpm, its fast end by power, rpm or the never-exceed speed. Climb speeds are those of the power asked for without regard to
// the maximum rpm or to placards; cautions say where they pass them.
//
// Best range and Carson's speed are kept inside the band and take over what sets an end of it. Endurance is given only where the speed of
// least power can be held.
//
// # Sources
//
// Air: ISO 2533:1975; water vapour by the formula of WMO-No. 8. Airspeeds: the compressible (subsonic) relations of a pitot-static
// system. Engine: Gagg and Ferrar (1934). Propeller: actuator disc; linear propeller polar of J. T. Lowry; measured tables with monotone
// cubics between the rows. Each file names its own beside the relation.
//
// # Domain and accuracy
//
// The table in domain.go is the domain; -2 to 20 km. The relations are solved to about 1e-12; that says nothing of how well the numbers fed in
// describe an aeroplane. Every answer is finite, or the error names each quantity, its value and what is allowed.
//
// # Use
//
//	var s perf.Solver
//	var answer perf.Answer
//	air, err := perf.AirAt(1200, 301.15, 0)
//	err = s.Solve(&aeroplane, &perf.Condition{Mass: 760, Air: air, PowerFraction: 1}, &answer)
package perf
