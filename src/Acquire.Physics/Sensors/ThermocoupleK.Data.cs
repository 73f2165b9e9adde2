namespace Acquire.Physics.Sensors;

/// <summary>Reference function of type K: NIST Monograph 175 (Burns et al. 1993), NIST SRD 60; the same in IEC 60584-1. E in mV, t in degC.</summary>
internal static class ThermocoupleKCoefficients
{
    /// <summary>-270 to 0 degC.</summary>
    public static readonly double[] Cold =
    [
        0.000000000000E+00, 0.394501280250E-01, 0.236223735980E-04, -0.328589067840E-06, -0.499048287770E-08, -0.675090591730E-10,
        -0.574103274280E-12, -0.310888728940E-14, -0.104516093650E-16, -0.198892668780E-19, -0.163226974860E-22,
    ];

    /// <summary>0 to 1372 degC, without the exponential term.</summary>
    public static readonly double[] Hot =
    [
        -0.176004136860E-01, 0.389212049750E-01, 0.185587700320E-04, -0.994575928740E-07, 0.318409457190E-09, -0.560728448890E-12,
        0.560750590590E-15, -0.320207200030E-18, 0.971511471520E-22, -0.121047212750E-25,
    ];

    /// <summary>The exponential term a0 exp(a1 (t - a2)^2) above 0 degC.</summary>
    public static readonly double[] Exponential = [0.118597600000E+00, -0.118343200000E-03, 0.126968600000E+03];
}
