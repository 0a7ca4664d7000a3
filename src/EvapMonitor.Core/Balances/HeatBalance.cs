namespace EvapMonitor.Core.Balances;

/// <summary>The heat balances of one effect, as algebra on flows and enthalpies: whoever brings the enthalpies decides whose tables are used.</summary>
public static class HeatBalance
{
    /// <summary>Duty that the liquor received, W: what the vapour and the leaving liquor carry off less what came in.</summary>
    /// <param name="heatIn">Flow times enthalpy of all that enters, W.</param>
    /// <param name="leaving">Flow of the leaving liquor, kg/s.</param>
    /// <param name="leavingEnthalpy">Its enthalpy, J/kg.</param>
    /// <param name="vapour">Vapour, kg/s.</param>
    /// <param name="vapourEnthalpy">Its enthalpy, J/kg.</param>
    public static double LiquorDuty(double heatIn, double leaving, double leavingEnthalpy, double vapour, double vapourEnthalpy) =>
        (vapour * vapourEnthalpy) + (leaving * leavingEnthalpy) - heatIn;

    /// <summary>Duty from the chest side, W: what the condensing steam gives up, less the loss.</summary>
    /// <param name="condensed">Steam that condenses, kg/s.</param>
    /// <param name="entering">Enthalpy of what enters the chest, J/kg.</param>
    /// <param name="condensate">Enthalpy of the condensate, J/kg.</param>
    /// <param name="loss">Share of that heat which the liquor does not receive, 0 to 1.</param>
    public static double ChestDuty(double condensed, double entering, double condensate, double loss) => condensed * (entering - condensate) * (1 - loss);

    /// <summary>Apparent coefficient U = Q/(A·(Ts − Tb)), W/(m²·K).</summary>
    /// <param name="duty">Q, W.</param>
    /// <param name="area">A, m².</param>
    /// <param name="drivingForce">Ts − Tb, K.</param>
    public static double Coefficient(double duty, double area, double drivingForce) => duty / (area * drivingForce);
}
