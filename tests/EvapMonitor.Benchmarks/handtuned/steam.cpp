// Water and steam by IAPWS-IF97, R7-97(2012), tuned by hand: the floor against which the C# implementation is measured.
// Every function is scalar and kept out of line, one call per state as a balance makes them; the batch loop is here so that crossing into native code does not count.
#include <cmath>
#include <cstddef>

namespace {

constexpr double R = 461.526;

[[gnu::always_inline]] inline double saturation_temperature_core(double p) {
    constexpr double n1 = 0.11670521452767e4, n2 = -0.72421316703206e6, n3 = -0.17073846940092e2, n4 = 0.12020824702470e5, n5 = -0.32325550322333e7,
        n6 = 0.14915108613530e2, n7 = -0.48232657361591e4, n8 = 0.40511340542057e6, n9 = -0.23855557567849, n10 = 0.65017534844798e3;
    const double b2 = std::sqrt(p * 1e-6), b = std::sqrt(b2);
    const double e = b2 + (n3 * b + n6), f = n1 * b2 + (n4 * b + n7), g = n2 * b2 + (n5 * b + n8);
    const double d = -2 * g / (f + std::sqrt(f * f - 4 * e * g));
    const double a = d - n10;
    return 0.5 * (n10 + d - std::sqrt(a * a - 4 * n9));
}

[[gnu::always_inline]] inline double liquid_enthalpy_core(double p, double t) {
    const double a = 7.1 - p * (1 / 16.53e6), s = 1386 / t - 1.222, r = 1 / s;
    const double s2 = s * s, s4 = s2 * s2, s5 = s4 * s, s8 = s4 * s4, s16 = s8 * s8;
    const double r2 = r * r, r3 = r2 * r, r4 = r2 * r2, r5 = r2 * r3, r6 = r3 * r3, r7 = r3 * r4, r8 = r4 * r4, r9 = r4 * r5, r10 = r5 * r5, r12 = r6 * r6;
    const double a2 = a * a, a4 = a2 * a2, a8 = a4 * a4;
    const double g0 = (-2 * 0.14632971213167 * r3 + (0.84548187169114 * r2 + 0.33855169168385e1))
        + s * ((5 * 0.81214629983568e-3 * s + 4 * -0.16616417199501e-1) * s2 + (3 * 0.15772038513228 * s + 2 * -0.95791963387872));
    const double g1 = -9 * 0.28319080123804e-3 * r10 + (7 * 0.60706301565874e-3 * r8
        + (0.18990068218419e-1 * r2 + (3 * -0.52838357969930e-4 * s2 + -0.21841717175414e-1)));
    const double g2 = 3 * 0.47184321073267e-3 * r4 + (17 * -0.72694996297594e-15 * s16 + (3 * -0.44141845330846e-5 * s2 + 0.47661393906987e-4));
    const double g3 = 4 * 0.31679644845054e-4 * r5 + 6 * -0.85205128120103e-9 * s5;
    const double g4 = 5 * 0.22425281908000e-5 * r6 + (2 * 0.65171222895601e-6 * r3 + 10 * -0.14341729937924e-12 * (s8 * s));
    const double g5 = 8 * 0.40516996860117e-6 * r9;
    const double g8 = 11 * 0.12734301741641e-8 * r12 + 6 * 0.17424871230634e-9 * r7;
    const double q = a * r, q2 = q * q, q3 = q2 * q, q6 = q3 * q3, q7 = q6 * q, q21 = q7 * q7 * q7;
    const double high = (-31 * 0.14478307828521e-19 * q2 + 29 * 0.68762131295531e-18)
        + q6 * q2 * r * ((41 * 0.93537087292458e-25 * q + -40 * 0.18228094581404e-23) * q2 + (39 * 0.11947622640071e-22 * q + -38 * 0.26335781662795e-22));
    const double low = (a * g1 + g0) + a2 * (a * g3 + g2);
    return R * 1386 * (low + (q21 * (r9 * high) + (a4 * (a * g5 + g4) + a8 * g8)));
}

[[gnu::always_inline]] inline double vapour_enthalpy_core(double pascal, double temperature) {
    const double tau = 540 / temperature, t = temperature * (1.0 / 540), t2 = t * t;
    const double ideal = (t2 * (t2 * (t2 * (5 * 0.56087911283020e-2) + (-4 * 0.71452738081455e-1 * t + 3 * 0.40710498223928))
            + (-2 * 0.14240819171444e1 * t + 0.43839511319450e1)) + 0.10086655968018e2)
        + tau * (3 * 0.21268463753307e-1 * tau + 2 * -0.28408632460772);
    const double s = tau - 0.5, s2 = s * s, s3 = s2 * s, s4 = s2 * s2, s5 = s2 * s3, s6 = s3 * s3, s7 = s3 * s4, s10 = s5 * s5, s12 = s6 * s6, s14 = s7 * s7;
    const double s15 = s5 * s10, s18 = s6 * s12, s19 = s12 * s7, s20 = s10 * s10, s24 = s12 * s12, s25 = s15 * s10, s28 = s14 * s14, s34 = s20 * s14;
    const double s35 = s15 * s20, s38 = s19 * s19, s52 = s28 * s24, s56 = s28 * s28;
    const double p = pascal * 1e-6, p2 = p * p, p4 = p2 * p2, p8 = p4 * p4, p16 = p8 * p8;
    const double g1 = 6 * -0.50325278727930e-1 * s5 + ((3 * -0.57581259083432e-1 * s + 2 * -0.45996013696365e-1) * s + -0.17834862292358e-1);
    const double g2 = 36 * -0.26674547914087e-4 * s35 + ((7 * -0.43797295650573e-1 * s3 + 4 * -0.39392777243355e-2) * s3 + (2 * -0.18948987516315e-3 * s + -0.33032641670203e-4));
    const double g3 = 35 * -0.40668253562649e-1 * s34 + ((6 * -0.15033924542148e-2 * s3 + 3 * -0.32277677238570e-4) * s2 + 0.43870667284435e-6);
    const double g4 = (3 * 0.48225372718507e-6 * s + 2 * 0.12790717852285e-7) * s + -0.78847309559367e-9;
    const double g5 = 7 * 0.22922076337661e-5 * s6;
    const double g6 = 35 * -0.23895741934104e2 * s34 + (16 * -0.21171472321355e-2 * s15 + 3 * -0.16714766451061e-10 * s2);
    const double g7 = 25 * -0.38946842435739e-1 * s24 + 11 * -0.12621808899101e-5 * s10;
    const double g8 = s7 * (36 * -0.82311340897998e1 * s28 + 8 * 0.11256211360459e-10);
    const double g9 = 13 * 0.19809712802088e-7 * s12;
    const double g10 = s3 * ((14 * -0.10018179379511e-8 * s4 + 10 * -0.10234747095929e-12) * s6 + 4 * 0.10406965210174e-18);
    const double g16 = s28 * (50 * 0.10693031879409 * (s * s20) + 29 * -0.80882908646985e-10);
    const double g18 = 57 * -0.33662250574171 * s56;
    const double g20 = s19 * ((48 * -0.42002467698208e-5 * (s3 * s10) + 35 * 0.30629316876232e-12) * s15 + 20 * 0.89185845355421e-24);
    const double g21 = 21 * -0.59056029685639e-25 * s20;
    const double g22 = 53 * 0.37826947613457e-5 * s52;
    const double g23 = 39 * -0.12768608934681e-14 * s38;
    const double g24 = s25 * ((58 * -0.94369707241210e-6 * s18 + 40 * 0.55414715350778e-16) * s14 + 26 * 0.73087610595061e-28);
    const double low = p2 * (p * g4 + g3) + (p * g2 + g1);
    const double middle = p2 * (p * g8 + g7) + (p * g6 + g5) + p4 * (p * g10 + g9);
    const double steep = (p2 * g18 + g16) + p4 * ((p2 * (p * g23 + g22) + (p * g21 + g20)) + p4 * g24);
    return R * 540 * (ideal + (p16 * steep + p * (p4 * middle + low)));
}

[[gnu::noinline]] double saturation_temperature(double p) { return saturation_temperature_core(p); }
[[gnu::noinline]] double vapour_enthalpy(double p, double t) { return vapour_enthalpy_core(p, t); }
[[gnu::noinline]] double saturated_vapour_enthalpy(double p) { return vapour_enthalpy_core(p, saturation_temperature_core(p)); }
[[gnu::noinline]] double saturated_liquid_enthalpy(double p) { return liquid_enthalpy_core(p, saturation_temperature_core(p)); }

}

extern "C" {

void batch_saturation_temperature(const double* p, const double*, double* out, std::size_t count) {
    for (std::size_t k = 0; k < count; k++) out[k] = saturation_temperature(p[k]);
}

void batch_vapour_enthalpy(const double* p, const double* t, double* out, std::size_t count) {
    for (std::size_t k = 0; k < count; k++) out[k] = vapour_enthalpy(p[k], t[k]);
}

void batch_saturated_vapour_enthalpy(const double* p, const double*, double* out, std::size_t count) {
    for (std::size_t k = 0; k < count; k++) out[k] = saturated_vapour_enthalpy(p[k]);
}

void batch_saturated_liquid_enthalpy(const double* p, const double*, double* out, std::size_t count) {
    for (std::size_t k = 0; k < count; k++) out[k] = saturated_liquid_enthalpy(p[k]);
}

}
