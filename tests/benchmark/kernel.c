/* One half stroke of the kernel in plain C: actuator/stroke/{equations,slopes,steppers,events,advance,cycle}.py line
 * for line, without ledger and history, as the yardstick of what the compiled kernel could reach. Places of the rows
 * (AREA_CAP, ...), constants of air (AIR_*) and coefficients of the pairs (DOPRI_*, RODAS_*) come from the Python
 * modules as macros on the compiler's command line, so they cannot drift. */

#include <math.h>
#include <stdbool.h>

enum { END, REVERSAL, EDGE, START, NONE = -1, FAILED = -2 };

typedef struct { double x, v, m1, u1, m2, u2; } State;
typedef struct { double p, temp, inflow, outflow, power, heat, gain; } Chamber;
typedef struct {
    double growth, wall, part, p, p_v, p_u, temp, temp_m, temp_u, inflow, outflow, inflow_p, outflow_p, outflow_t,
        port_temp;
} Tangent;
typedef struct { double m_x, m_m, m_u, u_x, u_v, u_m, u_u; } Block;
typedef struct { double a_x, a_v, a_u1, a_u2; Block cap, rod; } Jacobian;
typedef struct { Jacobian jacobian; State by_time; } Slopes;
typedef struct { double m_m, m_u, m_x, m_v, u_m, u_u, u_x, u_v; } Inverse;
typedef struct { double x, v_x, v_v, v_m1, v_u1, v_m2, v_u2; Inverse cap, rod; } System;
typedef struct { State y, k; double wrong, stiffness; } Step;
typedef struct { int event; double target, part; } Found;

static const State NOTHING = {0.0, 0.0, 0.0, 0.0, 0.0, 0.0};

static double larger(double a, double b) { return a > b ? a : b; }
static double smaller(double a, double b) { return a < b ? a : b; }

/* ---- flow/scalar.py, mechanics/friction.py ---- */

static double passage(double p_up, double p_down, double temp_up, double c, double b, double m)
{
    if (c <= 0.0 || p_down >= p_up) return 0.0;
    double linear = 1.0;
    if (p_down > LINEAR_FROM * p_up) {
        linear = (p_up - p_down) / ((1.0 - LINEAR_FROM) * p_up);
        p_down = LINEAR_FROM * p_up;
    }
    double bracket = 1.0;
    if (p_down > b * p_up) {
        double share = (p_down - b * p_up) / ((1.0 - b) * p_up);
        bracket = 1.0 - share * share;
        if (m != 0.5) bracket = exp(2.0 * m * log(bracket));
    }
    return c * p_up * AIR_RHO_ISO6358 * linear * sqrt(AIR_TEMP_ANR / temp_up * bracket);
}

static double passage_slope(double flow, double p_up, double p_down, double temp_up, double c, double b, double m)
{
    if (p_down > LINEAR_FROM * p_up)
        return -passage(p_up, LINEAR_FROM * p_up, temp_up, c, b, m) / ((1.0 - LINEAR_FROM) * p_up);
    if (p_down <= b * p_up) return 0.0;
    double width = (1.0 - b) * p_up;
    double share = (p_down - b * p_up) / width;
    return -2.0 * m * share * flow / ((1.0 - share * share) * width);
}

static double running(double speed, const double *par)
{
    double steady = par[COULOMB] + par[VISCOUS] * speed;
    if (speed > 7.0 * par[STRIBECK]) return steady;
    double share = speed / par[STRIBECK];
    return steady + (par[BREAKAWAY] - par[COULOMB]) * exp(-share * share);
}

static double running_slope(double speed, const double *par)
{
    double share = speed / par[STRIBECK];
    return par[VISCOUS] - (par[BREAKAWAY] - par[COULOMB]) * 2.0 * share / par[STRIBECK] * exp(-share * share);
}

/* ---- equations.py ---- */

static void connect(double *mode, const double *par)
{
    for (int cap = 1; cap >= 0; cap--) {
        int link = cap ? CAP_LINK : ROD_LINK, path = cap ? CAP_FILL : ROD_FILL, into, out_of;
        bool on_supply = (mode[SIDE] > 0.0) == (cap == 1);
        if (on_supply) {
            mode[link + PORT_P] = cap ? par[P_EXTEND] : par[P_RETRACT];
            mode[link + PORT_T] = par[T_SUPPLY];
            into = FILL, out_of = BACK;
        } else {
            mode[link + PORT_P] = par[P_AMB];
            mode[link + PORT_T] = par[T_AMB];
            into = SUCK, out_of = VENT;
        }
        for (int i = 0; i < 3; i++) {
            mode[link + INTO + i] = par[path + into + i];
            mode[link + OUT_OF + i] = par[path + out_of + i];
        }
        if (on_supply && mode[SHUT] > 0.5) mode[link + INTO] = mode[link + OUT_OF] = 0.0;
    }
}

static double opening(double time, const double *mode)
{
    double over = mode[OPEN_OVER], since = time - mode[SWITCHED];
    if (since >= over || over <= 0.0) return 1.0;
    return larger(since, 0.0) / over;
}

static double wall_heat(double area, double temp, double q_in, double t_in, double q_out, double pdv, const double *par)
{
    if (par[INDEX] == 0.0) return par[HEAT] * area * (par[T_AMB] - temp);
    return (par[INDEX] - AIR_GAMMA) / (AIR_GAMMA - 1.0) * (AIR_R_AIR * (t_in * q_in - temp * q_out) - pdv);
}

static Chamber chamber(double m, double u, double dead, double volume, double growth, double wall, double part,
                       int link, const double *mode, const double *par)
{
    m = larger(m, 1e-12);
    u = larger(u, 1e-7);
    volume = larger(volume, 0.1 * dead);
    double p = (AIR_GAMMA - 1.0) * u / volume, temp = u / (m * AIR_CV);
    double port = mode[link + PORT_P], port_temp = mode[link + PORT_T], inflow = 0.0, outflow = 0.0;
    if (port > p) {
        const double *way = mode + link + INTO;
        inflow = passage(port, p, port_temp, part * way[0], way[1], way[2]);
    } else {
        const double *way = mode + link + OUT_OF;
        outflow = passage(p, port, temp, part * way[0], way[1], way[2]);
    }
    double power = p * growth, heat = wall_heat(wall, temp, inflow, port_temp, outflow, power, par);
    double gain = AIR_CP * port_temp * inflow - AIR_CP * temp * outflow + (heat - power);
    return (Chamber){p, temp, inflow, outflow, power, heat, gain};
}

static Chamber vented(double growth, const double *par)
{
    return (Chamber){par[P_AMB], par[T_AMB], 0.0, 0.0, par[P_AMB] * growth, 0.0, 0.0};
}

static Chamber cap_chamber(double part, State y, const double *mode, const double *par)
{
    double x = y.x, area = par[AREA_CAP], dead = par[DEAD_CAP], wall = M_PI * par[BORE] * x + 2.0 * area;
    if (par[VENTED_CAP] > 0.5) return vented(area * y.v, par);
    return chamber(y.m1, y.u1, dead, dead + area * x, area * y.v, wall, part, CAP_LINK, mode, par);
}

static Chamber rod_chamber(double part, State y, const double *mode, const double *par)
{
    double x = par[STROKE] - y.x, area = par[AREA_ROD], dead = par[DEAD_ROD], wall = M_PI * par[BORE] * x + 2.0 * area;
    if (par[VENTED_ROD] > 0.5) return vented(-area * y.v, par);
    return chamber(y.m2, y.u2, dead, dead + area * x, -area * y.v, wall, part, ROD_LINK, mode, par);
}

static double opposing(const double *mode, const double *par)
{
    return mode[DIRECTION] > 0.0 ? par[EXTEND_FORCE] + mode[PROCESS] : par[RETRACT_FORCE];
}

static double rubbing(double v, const double *mode, const double *par)
{
    return par[GUIDE] + running(mode[DIRECTION] * v, par);
}

static double push(double p1, double p2, double x, const double *par)
{
    double area1 = par[AREA_CAP], area2 = par[AREA_ROD];
    double pressures = p1 * area1 - p2 * area2 - par[P_AMB] * (area1 - area2);
    return pressures - par[WEIGHT] + par[CONSTANT] + par[SPRING_FORCE] + par[SPRING_RATE] * x;
}

static State rates(double time, State y, const double *mode, const double *par)
{
    double part = opening(time, mode);
    Chamber cap = cap_chamber(part, y, mode, par), rod = rod_chamber(part, y, mode, par);
    double direction = mode[DIRECTION], acceleration = 0.0;
    if (direction != 0.0) {
        double against = opposing(mode, par) + rubbing(y.v, mode, par);
        acceleration = (push(cap.p, rod.p, y.x, par) - direction * against) / par[MASS];
    }
    return (State){y.v, acceleration, cap.inflow - cap.outflow, cap.gain, rod.inflow - rod.outflow, rod.gain};
}

static double drive(State y, const double *par)
{
    double vol1 = par[DEAD_CAP] + par[AREA_CAP] * y.x, vol2 = par[DEAD_ROD] + par[AREA_ROD] * (par[STROKE] - y.x);
    double p1 = par[VENTED_CAP] > 0.5 ? par[P_AMB] : (AIR_GAMMA - 1.0) * y.u1 / vol1;
    double p2 = par[VENTED_ROD] > 0.5 ? par[P_AMB] : (AIR_GAMMA - 1.0) * y.u2 / vol2;
    return push(p1, p2, y.x, par);
}

static double excess(State y, const double *mode, const double *par)
{
    double d = drive(y, par), hold = par[BREAKAWAY] + par[GUIDE];
    double out = d - hold - par[EXTEND_FORCE] - mode[PROCESS], back = -d - hold - par[RETRACT_FORCE];
    if (y.x >= par[STROKE]) return back;
    if (y.x <= 0.0) return out;
    return larger(out, back);
}

/* ---- slopes.py ---- */

static Tangent tangent(double m, double u, double volume, double growth, double wall, double part, int link,
                       const double *mode)
{
    double p = (AIR_GAMMA - 1.0) * u / volume, temp = u / (m * AIR_CV);
    double port = mode[link + PORT_P], port_temp = mode[link + PORT_T];
    double inflow = 0.0, inflow_p = 0.0, outflow = 0.0, outflow_p = 0.0;
    if (port > p) {
        const double *way = mode + link + INTO;
        inflow = passage(port, p, port_temp, way[0], way[1], way[2]);
        inflow_p = passage_slope(inflow, port, p, port_temp, way[0], way[1], way[2]);
    } else {
        const double *way = mode + link + OUT_OF;
        outflow = passage(p, port, temp, way[0], way[1], way[2]);
        outflow_p = (outflow - port * passage_slope(outflow, p, port, temp, way[0], way[1], way[2])) / p;
    }
    return (Tangent){growth, wall, part, p, -p / volume, p / u, temp, -temp / m, temp / u, inflow, outflow, inflow_p,
                     outflow_p, -0.5 * outflow / temp, port_temp};
}

static Tangent vented_tangent(double growth, const double *par)
{
    return (Tangent){.growth = growth, .p = par[P_AMB], .temp = par[T_AMB], .port_temp = par[T_AMB]};
}

static Tangent cap_tangent(double time, State y, const double *mode, const double *par)
{
    double x = y.x, area = par[AREA_CAP], wall = M_PI * par[BORE] * x + 2.0 * area;
    if (par[VENTED_CAP] > 0.5) return vented_tangent(area * y.v, par);
    return tangent(y.m1, y.u1, par[DEAD_CAP] + area * x, area * y.v, wall, opening(time, mode), CAP_LINK, mode);
}

static Tangent rod_tangent(double time, State y, const double *mode, const double *par)
{
    double x = par[STROKE] - y.x, area = par[AREA_ROD], wall = M_PI * par[BORE] * x + 2.0 * area;
    if (par[VENTED_ROD] > 0.5) return vented_tangent(-area * y.v, par);
    return tangent(y.m2, y.u2, par[DEAD_ROD] + area * x, -area * y.v, wall, opening(time, mode), ROD_LINK, mode);
}

static Chamber chamber_change(Tangent air, double area, double dx, double dv, double dm, double du, double dpart,
                              const double *par)
{
    double dwall = copysign(M_PI * par[BORE], area) * dx;
    double dp = air.p_u * du + air.p_v * area * dx, dtemp = air.temp_u * du + air.temp_m * dm;
    double dinflow = air.part * air.inflow_p * dp + air.inflow * dpart;
    double doutflow = air.part * (air.outflow_p * dp + air.outflow_t * dtemp) + air.outflow * dpart;
    double dpower = dp * air.growth + air.p * area * dv, dheat;
    if (air.wall == 0.0) {
        dheat = 0.0;
    } else if (par[INDEX] == 0.0) {
        dheat = par[HEAT] * (dwall * (par[T_AMB] - air.temp) - air.wall * dtemp);
    } else {
        double leaving = air.temp * doutflow + air.part * air.outflow * dtemp;
        dheat = (par[INDEX] - AIR_GAMMA) / (AIR_GAMMA - 1.0) * (AIR_R_AIR * (air.port_temp * dinflow - leaving) - dpower);
    }
    double carried = air.temp * doutflow + air.part * air.outflow * dtemp;
    double gain = AIR_CP * (air.port_temp * dinflow - carried) - dpower + dheat;
    return (Chamber){dp, dtemp, dinflow, doutflow, dpower, dheat, gain};
}

static Block block(Tangent air, double area, const double *par)
{
    if (air.wall == 0.0) return (Block){0.0, 0.0, 0.0, 0.0, 0.0, 0.0, 0.0};
    double into = air.part * air.inflow_p, out_of = air.part * air.outflow_p, out_t = air.part * air.outflow_t;
    double out = air.part * air.outflow, by_p = air.port_temp * into - air.temp * out_of;
    double by_t = -(air.temp * out_t + out), power, energy_p, energy_t, warmed;
    if (par[INDEX] == 0.0) {
        power = -1.0;
        energy_p = AIR_CP * by_p;
        energy_t = AIR_CP * by_t - par[HEAT] * air.wall;
        warmed = par[HEAT] * copysign(M_PI * par[BORE], area) * (par[T_AMB] - air.temp);
    } else {
        double implied = (par[INDEX] - AIR_GAMMA) / (AIR_GAMMA - 1.0);
        power = -1.0 - implied;
        energy_p = (AIR_CP + implied * AIR_R_AIR) * by_p;
        energy_t = (AIR_CP + implied * AIR_R_AIR) * by_t;
        warmed = 0.0;
    }
    double mass_p = into - out_of;
    energy_p += power * air.growth;
    return (Block){mass_p * air.p_v * area, -out_t * air.temp_m, mass_p * air.p_u - out_t * air.temp_u,
                   energy_p * air.p_v * area + warmed, power * air.p * area, energy_t * air.temp_m,
                   energy_p * air.p_u + energy_t * air.temp_u};
}

static Jacobian jacobian(Tangent cap, Tangent rod, State y, const double *mode, const double *par)
{
    double area1 = par[AREA_CAP], area2 = par[AREA_ROD], direction = mode[DIRECTION], mass = par[MASS];
    Jacobian jac = {0.0, 0.0, 0.0, 0.0, block(cap, area1, par), block(rod, -area2, par)};
    if (direction == 0.0) return jac;
    jac.a_x = (cap.p_v * area1 * area1 + rod.p_v * area2 * area2 + par[SPRING_RATE]) / mass;
    jac.a_v = -running_slope(direction * y.v, par) / mass;
    jac.a_u1 = cap.p_u * area1 / mass;
    jac.a_u2 = -rod.p_u * area2 / mass;
    return jac;
}

static State ramp(Tangent cap, Tangent rod, double time, const double *mode, const double *par)
{
    if (opening(time, mode) >= 1.0) return NOTHING;
    double dpart = 1.0 / mode[OPEN_OVER];
    Chamber change1 = chamber_change(cap, par[AREA_CAP], 0.0, 0.0, 0.0, 0.0, dpart, par);
    Chamber change2 = chamber_change(rod, -par[AREA_ROD], 0.0, 0.0, 0.0, 0.0, dpart, par);
    return (State){0.0, 0.0, change1.inflow - change1.outflow, change1.gain, change2.inflow - change2.outflow,
                   change2.gain};
}

static Slopes slopes_at(double time, State y, const double *mode, const double *par)
{
    Tangent cap = cap_tangent(time, y, mode, par), rod = rod_tangent(time, y, mode, par);
    return (Slopes){jacobian(cap, rod, y, mode, par), ramp(cap, rod, time, mode, par)};
}

static Inverse inverse(double g, Block own)
{
    double pivot_u = 1.0 / (g - own.u_u), ratio = own.m_u * pivot_u, m_m = 1.0 / (g - own.m_m - ratio * own.u_m);
    double m_x = (own.m_x + ratio * own.u_x) * m_m / g, u_x = (own.u_x / g + own.u_m * m_x) * pivot_u;
    double m_v = m_x + ratio * own.u_v * m_m, u_v = (own.u_x / g + own.u_v + own.u_m * m_v) * pivot_u;
    return (Inverse){m_m, ratio * m_m, m_x, m_v, own.u_m * m_m * pivot_u, (1.0 + own.u_m * ratio * m_m) * pivot_u,
                     u_x, u_v};
}

static System solved(double g, const Jacobian *jac)
{
    Inverse cap = inverse(g, jac->cap), rod = inverse(g, jac->rod);
    double by_x = jac->a_x / g + jac->a_u1 * cap.u_x + jac->a_u2 * rod.u_x;
    double by_v = jac->a_v + jac->a_x / g + jac->a_u1 * cap.u_v + jac->a_u2 * rod.u_v;
    double v_v = 1.0 / (g - by_v), v_1 = v_v * jac->a_u1, v_2 = v_v * jac->a_u2;
    return (System){1.0 / g, v_v * by_x, v_v, v_1 * cap.u_m, v_1 * cap.u_u, v_2 * rod.u_m, v_2 * rod.u_u, cap, rod};
}

static State solve(const System *left, State r)
{
    const Inverse *cap = &left->cap, *rod = &left->rod;
    double v = (left->v_x * r.x + left->v_v * r.v) + (left->v_m1 * r.m1 + left->v_u1 * r.u1) +
               (left->v_m2 * r.m2 + left->v_u2 * r.u2);
    return (State){(r.x + v) * left->x, v,
                   (cap->m_m * r.m1 + cap->m_u * r.u1 + cap->m_x * r.x) + cap->m_v * v,
                   (cap->u_m * r.m1 + cap->u_u * r.u1 + cap->u_x * r.x) + cap->u_v * v,
                   (rod->m_m * r.m2 + rod->m_u * r.u2 + rod->m_x * r.x) + rod->m_v * v,
                   (rod->u_m * r.m2 + rod->u_u * r.u2 + rod->u_x * r.x) + rod->u_v * v};
}

/* ---- steppers.py ---- */

static State shifted(State y, double by, State k)
{
    return (State){y.x + by * k.x, y.v + by * k.v, y.m1 + by * k.m1, y.u1 + by * k.u1, y.m2 + by * k.m2,
                   y.u2 + by * k.u2};
}

static State scaled(double by, State k)
{
    return (State){by * k.x, by * k.v, by * k.m1, by * k.u1, by * k.m2, by * k.u2};
}

static State sizes(State y, State z, const double *par)
{
    return (State){par[STROKE], larger(fabs(y.v), fabs(z.v)) + 0.1, larger(fabs(y.m1), fabs(z.m1)),
                   larger(fabs(y.u1), fabs(z.u1)), larger(fabs(y.m2), fabs(z.m2)), larger(fabs(y.u2), fabs(z.u2))};
}

static double spread(State a, State b, State size)
{
    double d0 = (a.x - b.x) / size.x, d1 = (a.v - b.v) / size.v, d2 = (a.m1 - b.m1) / size.m1;
    double d3 = (a.u1 - b.u1) / size.u1, d4 = (a.m2 - b.m2) / size.m2, d5 = (a.u2 - b.u2) / size.u2;
    return d0 * d0 + d1 * d1 + d2 * d2 + d3 * d3 + d4 * d4 + d5 * d5;
}

static Step explicit_step(double time, double h, State y, State k1, const double *mode, const double *par)
{
    State s = shifted(y, h * DOPRI_A21, k1);
    State k2 = rates(time + h * DOPRI_T2, s, mode, par);

    s = shifted(y, h * DOPRI_A31, k1);
    s = shifted(s, h * DOPRI_A32, k2);
    State k3 = rates(time + h * DOPRI_T3, s, mode, par);

    s = shifted(y, h * DOPRI_A41, k1);
    s = shifted(s, h * DOPRI_A42, k2);
    s = shifted(s, h * DOPRI_A43, k3);
    State k4 = rates(time + h * DOPRI_T4, s, mode, par);

    s = shifted(y, h * DOPRI_A51, k1);
    s = shifted(s, h * DOPRI_A52, k2);
    s = shifted(s, h * DOPRI_A53, k3);
    s = shifted(s, h * DOPRI_A54, k4);
    State k5 = rates(time + h * DOPRI_T5, s, mode, par);

    State s6 = shifted(y, h * DOPRI_A61, k1);
    s6 = shifted(s6, h * DOPRI_A62, k2);
    s6 = shifted(s6, h * DOPRI_A63, k3);
    s6 = shifted(s6, h * DOPRI_A64, k4);
    s6 = shifted(s6, h * DOPRI_A65, k5);
    State k6 = rates(time + h, s6, mode, par);

    State end = shifted(y, h * DOPRI_B1, k1);
    end = shifted(end, h * DOPRI_B3, k3);
    end = shifted(end, h * DOPRI_B4, k4);
    end = shifted(end, h * DOPRI_B5, k5);
    end = shifted(end, h * DOPRI_B6, k6);
    State k7 = rates(time + h, end, mode, par);

    State error = scaled(h * DOPRI_E1, k1);
    error = shifted(error, h * DOPRI_E3, k3);
    error = shifted(error, h * DOPRI_E4, k4);
    error = shifted(error, h * DOPRI_E5, k5);
    error = shifted(error, h * DOPRI_E6, k6);
    error = shifted(error, h * DOPRI_E7, k7);

    State size = sizes(y, end, par);
    double distance = spread(end, s6, size);
    return (Step){end, k7, sqrt(spread(error, NOTHING, size) / 6.0),
                  distance > 0.0 ? h * sqrt(spread(k7, k6, size) / distance) : 0.0};
}

static Step implicit_step(double time, double h, State y, State k1, const Slopes *slopes, const double *mode,
                          const double *par)
{
    double per_h = 1.0 / h;
    System left = solved(per_h * (1.0 / RODAS_GAMMA), &slopes->jacobian);
    State ft = slopes->by_time, known;

    State u1 = solve(&left, shifted(k1, h * RODAS_D1, ft));

    State s = shifted(y, RODAS_A21, u1);
    known = scaled(h * RODAS_D2, ft);
    known = shifted(known, RODAS_C21 * per_h, u1);
    State u2 = solve(&left, shifted(known, 1.0, rates(time + RODAS_T2 * h, s, mode, par)));

    s = shifted(y, RODAS_A31, u1);
    s = shifted(s, RODAS_A32, u2);
    known = scaled(h * RODAS_D3, ft);
    known = shifted(known, RODAS_C31 * per_h, u1);
    known = shifted(known, RODAS_C32 * per_h, u2);
    State u3 = solve(&left, shifted(known, 1.0, rates(time + RODAS_T3 * h, s, mode, par)));

    s = shifted(y, RODAS_A41, u1);
    s = shifted(s, RODAS_A42, u2);
    s = shifted(s, RODAS_A43, u3);
    known = scaled(h * RODAS_D4, ft);
    known = shifted(known, RODAS_C41 * per_h, u1);
    known = shifted(known, RODAS_C42 * per_h, u2);
    known = shifted(known, RODAS_C43 * per_h, u3);
    State u4 = solve(&left, shifted(known, 1.0, rates(time + RODAS_T4 * h, s, mode, par)));

    State s5 = shifted(y, RODAS_A51, u1);
    s5 = shifted(s5, RODAS_A52, u2);
    s5 = shifted(s5, RODAS_A53, u3);
    s5 = shifted(s5, RODAS_A54, u4);
    known = scaled(RODAS_C51 * per_h, u1);
    known = shifted(known, RODAS_C52 * per_h, u2);
    known = shifted(known, RODAS_C53 * per_h, u3);
    known = shifted(known, RODAS_C54 * per_h, u4);
    State u5 = solve(&left, shifted(known, 1.0, rates(time + h, s5, mode, par)));

    State s6 = shifted(s5, 1.0, u5);
    known = scaled(RODAS_C61 * per_h, u1);
    known = shifted(known, RODAS_C62 * per_h, u2);
    known = shifted(known, RODAS_C63 * per_h, u3);
    known = shifted(known, RODAS_C64 * per_h, u4);
    known = shifted(known, RODAS_C65 * per_h, u5);
    State u6 = solve(&left, shifted(known, 1.0, rates(time + h, s6, mode, par)));

    State end = shifted(s6, 1.0, u6);
    double parts = mode[DIRECTION] != 0.0 ? 6.0 : 4.0;
    return (Step){end, rates(time + h, end, mode, par), sqrt(spread(u6, NOTHING, sizes(y, end, par)) / parts), 0.0};
}

/* ---- events.py ---- */

static double process_at(double x, int n_edges, const double *edges, const double *forces, const double *par)
{
    int place = 0;
    for (int i = 0; i < n_edges; i++)
        if (x >= edges[i] - 1e-12 * par[STROKE]) place = i + 1;
    return forces[place];
}

static double next_edge(double x, const double *mode, const double *par, int n_edges, const double *edges)
{
    double slack = 1e-12 * par[STROKE];
    if (mode[DIRECTION] > 0.0) {
        double found = 2.0 * par[STROKE];
        for (int i = 0; i < n_edges; i++)
            if (x + slack < edges[i] && edges[i] < found) found = edges[i];
        if (mode[SIDE] > 0.0 && mode[SHUT] < 0.5 && par[CUT_EXTEND] < found) found = par[CUT_EXTEND];
        return found;
    }
    return mode[SIDE] < 0.0 && mode[SHUT] < 0.5 ? par[CUT_RETRACT] : -par[STROKE];
}

static double start_direction(State y, const double *mode, const double *par)
{
    if (y.x >= par[STROKE]) return -1.0;
    if (y.x <= 0.0) return 1.0;
    double d = drive(y, par);
    return d - par[EXTEND_FORCE] - mode[PROCESS] > -d - par[RETRACT_FORCE] ? 1.0 : -1.0;
}

static double event_value(int kind, State y, const double *mode, const double *par, double target)
{
    if (kind == REVERSAL) return -mode[DIRECTION] * y.v;
    if (kind == START) return excess(y, mode, par);
    return mode[DIRECTION] * (y.x - target);
}

static double event_slope(int kind, State y, State k, const double *mode, const double *par)
{
    if (kind == REVERSAL) return -mode[DIRECTION] * k.v;
    if (kind == START) {
        double vol1 = par[DEAD_CAP] + par[AREA_CAP] * y.x, vol2 = par[DEAD_ROD] + par[AREA_ROD] * (par[STROKE] - y.x);
        double rise = (AIR_GAMMA - 1.0) * (k.u1 / vol1 * par[AREA_CAP] - k.u2 / vol2 * par[AREA_ROD]);
        return start_direction(y, mode, par) > 0.0 ? rise : -rise;
    }
    return mode[DIRECTION] * k.x;
}

static double first_guess(double g0, double s0, double g1, double s1, double h)
{
    double low = 0.0, high = 1.0;
    for (int i = 0; i < 26; i++) {
        double z = 0.5 * (low + high);
        double value = (1.0 + 2.0 * z) * (1.0 - z) * (1.0 - z) * g0 + z * (1.0 - z) * (1.0 - z) * h * s0 +
                       z * z * (3.0 - 2.0 * z) * g1 + z * z * (z - 1.0) * h * s1;
        if (value < 0.0) low = z; else high = z;
    }
    return 0.5 * (low + high) * h;
}

static double first_step(State y, State k, const double *mode, const double *par)
{
    double fastest = fabs(k.x) / par[STROKE];
    fastest = larger(fastest, fabs(k.v) / (fabs(y.v) + 0.1));
    fastest = larger(fastest, larger(fabs(k.m1) / y.m1, fabs(k.u1) / y.u1));
    fastest = larger(fastest, larger(fabs(k.m2) / y.m2, fabs(k.u2) / y.u2));
    double h = 0.01 / larger(fastest, 1e-6);
    return mode[OPEN_OVER] > 0.0 ? smaller(h, mode[OPEN_OVER]) : h;
}

/* ---- advance.py ---- */

static double event_ahead(State y, State k, const double *mode, const double *par)
{
    double direction = mode[DIRECTION];
    if (direction == 0.0) {
        double lack = -excess(y, mode, par), rise = event_slope(START, y, k, mode, par);
        return lack > 0.0 && rise > 0.0 && mode[ARMED] > 0.5 ? lack / rise : INFINITY;
    }
    double way = direction > 0.0 ? par[STROKE] - y.x : y.x, v = direction * y.v;
    double square = v * v + 2.0 * direction * k.v * way;
    if (square <= 0.0 || v + sqrt(square) <= 0.0) return INFINITY;
    return 2.0 * way / (v + sqrt(square));
}

static double fitted(double time, double h, double limit)
{
    if (time + 1.001 * h >= limit) return limit - time;
    if (time + 2.0 * h > limit) return 0.5 * (limit - time);
    return h;
}

static double resized(double wrong, bool implicit)
{
    if (wrong < 1e-4) return 5.0;
    if (wrong < 1e12) return smaller(5.0, larger(0.2, 0.9 / (implicit ? sqrt(sqrt(wrong)) : pow(wrong, 0.2))));
    return 0.2;
}

static Found event_of_motion(State y, State k, State end_y, State end_k, double taken, const double *mode,
                             const double *par, int n_edges, const double *edges)
{
    double direction = mode[DIRECTION];
    if (y.v == 0.0 && direction * end_y.v <= 0.0) return (Found){FAILED, 0.0, 0.0};
    double end = direction > 0.0 ? par[STROKE] : 0.0, edge = next_edge(y.x, mode, par, n_edges, edges);
    double nearer = direction > 0.0 ? smaller(edge, end) : larger(edge, end);
    Found found = {NONE, 0.0, taken};
    if (direction * (end_y.x - nearer) < 0.0 && 0.0 < direction * end_y.v) return found;
    for (int kind = 0; kind < 3; kind++) {
        double goal = kind == EDGE ? edge : end, after = event_value(kind, end_y, mode, par, goal);
        if (after >= 0.0) {
            double before = event_value(kind, y, mode, par, goal), slope = event_slope(kind, y, k, mode, par);
            double part = first_guess(before, slope, after, event_slope(kind, end_y, end_k, mode, par), taken);
            if (found.event == NONE || part < found.part) found = (Found){kind, goal, part};
        }
    }
    return found;
}

static Found event_at_rest(State y, State k, State end_y, State end_k, double taken, const double *mode,
                           const double *par)
{
    double after = excess(end_y, mode, par);
    if (mode[ARMED] < 0.5 || after <= 0.0) return (Found){NONE, 0.0, taken};
    double before = excess(y, mode, par), slope = event_slope(START, y, k, mode, par);
    return (Found){START, 0.0,
                   first_guess(before, slope, after, event_slope(START, end_y, end_k, mode, par), taken)};
}

static double closeness(int event, double rtol, const double *par)
{
    double near = larger(1e-11, 1e-5 * rtol);
    if (event == START) return 10.0 * near * par[P_LINE] * par[AREA_CAP];
    return event == REVERSAL ? near : near * par[STROKE];
}

typedef struct { State y, k; double taken, h, target; int event; } Advance;

static Advance advance(double time, double h, double limit, double rtol, State y, State k, double *mode,
                       const double *par, int n_edges, const double *edges, double *steps)
{
    bool moving = mode[DIRECTION] != 0.0, implicit = !moving || rtol >= 1e-5 || mode[STIFF] >= 12.0, retried = false;
    double taken = fitted(time, smaller(h, 1.1 * event_ahead(y, k, mode, par)), limit), following = h;
    double low = 0.0, high = taken;
    Found found = {NONE, 0.0, taken};
    Slopes slopes;
    Step step;
    if (implicit) slopes = slopes_at(time, y, mode, par);
    for (;;) {
        *steps += 1.0;
        step = implicit ? implicit_step(time, taken, y, k, &slopes, mode, par)
                        : explicit_step(time, taken, y, k, mode, par);
        if (*steps > 20000.0) break;
        if (found.event == NONE) {
            double wrong = step.wrong / rtol, factor = resized(wrong, implicit);
            if (wrong <= 1.0) {
                if (retried) factor = smaller(factor, 1.0);
                following = larger(taken * factor, taken < following ? following : 0.0);
            } else {
                retried = true;
                following = taken * smaller(factor, 0.9);
                taken = fitted(time, following, limit);
                continue;
            }
            found = moving ? event_of_motion(y, k, step.y, step.k, taken, mode, par, n_edges, edges)
                           : event_at_rest(y, k, step.y, step.k, taken, mode, par);
            if (found.event < 0) break;
            high = taken;
            taken = found.part;
            continue;
        }
        double g = event_value(found.event, step.y, mode, par, found.target);
        if (fabs(g) <= closeness(found.event, rtol, par) || high - low <= 1e-14 * larger(limit, high)) break;
        if (g < 0.0) low = taken; else high = taken;
        double slope = event_slope(found.event, step.y, step.k, mode, par);
        double guess = slope > 0.0 ? taken - g / slope : -1.0;
        taken = low < guess && guess < high ? guess : 0.5 * (low + high);
    }
    if (!implicit) mode[STIFF] = step.stiffness > 1.5 ? mode[STIFF] + 1.0 : larger(mode[STIFF] - 1.0, 0.0);
    return (Advance){step.y, step.k, taken, following, found.target, found.event};
}

/* ---- cycle.py: one stroke, commanded at time 0; returns time of arrival, speed and number of steps ---- */

static void half_stroke(double period, double way, double rtol, const double *y, double *mode, const double *par,
                        int n_edges, const double *edges, const double *forces, double *result)
{
    State now = {y[X], y[V], y[M_CAP], y[U_CAP], y[M_ROD], y[U_ROD]}, k = now;
    double time = 0.0, h = 0.0, steps = 0.0;
    bool fresh = true;
    mode[SIDE] = way;
    mode[SWITCHED] = 0.0;
    mode[OPEN_OVER] = par[OPENING];
    mode[SHUT] = (way > 0.0 ? now.x >= par[CUT_EXTEND] : now.x <= par[CUT_RETRACT]) ? 1.0 : 0.0;
    mode[STIFF] = 0.0;
    connect(mode, par);
    result[0] = -1.0;
    while (time < period * (1.0 - 1e-13) && steps <= 20000.0) {
        double limit = period, ramp_end = mode[SWITCHED] + mode[OPEN_OVER];
        if (mode[OPEN_OVER] > 0.0) {
            if (ramp_end <= time) mode[OPEN_OVER] = 0.0;
            else if (ramp_end < limit) limit = ramp_end;
        }
        if (fresh) {
            if (mode[DIRECTION] == 0.0 && mode[ARMED] > 0.5 && excess(now, mode, par) >= 0.0)
                mode[DIRECTION] = start_direction(now, mode, par);
            k = rates(time, now, mode, par);
            h = first_step(now, k, mode, par);
            fresh = false;
        }
        Advance found = advance(time, h, limit, rtol, now, k, mode, par, n_edges, edges, &steps);
        h = found.h;
        double direction = mode[DIRECTION];
        if (found.event == FAILED) {
            mode[DIRECTION] = mode[ARMED] = 0.0;
            fresh = true;
            continue;
        }
        time = found.event == NONE && time + found.taken >= limit * (1.0 - 1e-15) ? limit : time + found.taken;
        now = found.y;
        k = found.k;
        if (found.event == END || found.event == EDGE) now.x = found.target;
        if (found.event == REVERSAL) now.v = 0.0;
        if (found.event == NONE) {
            if (mode[DIRECTION] == 0.0 && mode[ARMED] < 0.5) {
                double over = excess(now, mode, par);
                bool risen = over > 1e-6 * par[P_LINE] * par[AREA_CAP];
                if (over < 0.0 || risen) mode[ARMED] = 1.0;
                fresh = risen;
            }
            continue;
        }
        if (found.event == START) {
            mode[DIRECTION] = start_direction(now, mode, par);
        } else if (found.event == EDGE) {
            if (found.target == par[CUT_EXTEND] || found.target == par[CUT_RETRACT]) {
                mode[SHUT] = 1.0;
                connect(mode, par);
            }
        } else {
            mode[DIRECTION] = 0.0;
        }
        mode[STIFF] = 0.0;
        mode[ARMED] = 1.0;
        mode[PROCESS] = process_at(now.x, n_edges, edges, forces, par);
        fresh = true;
        if (found.event == END) {
            if (direction == way) {
                result[0] = time;
                result[1] = fabs(now.v);
                break;
            }
            now.v = 0.0;
        }
    }
    result[2] = steps;
}

/* A batch: one row of each table a case, as actuator/stroke/batch.py; three results a case. */
void half_strokes(int cases, double way, double rtol, const double *periods, const double *y, double *mode,
                  const double *par, int n_edges, const double *edges, const double *forces, double *results)
{
    for (int i = 0; i < cases; i++)
        half_stroke(periods[i], way, rtol, y + i * N_LEDGER, mode + i * N_MODE, par + i * N_PAR, n_edges,
                    edges + i * n_edges, forces + i * (n_edges + 1), results + 3 * i);
}
