namespace GeoCulvert.Design.Hydraulics;

/// <summary>
/// A cross-section of flow: from a depth to its area, width, perimeter and centroid. Barrels are closed at <see cref="RiseM"/>; channels are open
/// (<see cref="RiseM"/> infinite).
/// </summary>
public interface ISection
{
    /// <summary>Height of a closed section, m; positive infinity for an open one.</summary>
    double RiseM { get; }

    /// <summary>Greatest width of a closed section, m.</summary>
    double SpanM { get; }

    /// <summary>Whole area of a closed section, m2.</summary>
    double FullAreaM2 { get; }

    /// <summary>Whole perimeter of a closed section, m.</summary>
    double FullPerimeterM { get; }

    /// <summary>Depth at which the conveyance of a closed section is largest, m.</summary>
    double PeakConveyanceDepthM { get; }

    /// <summary>Flow area at a depth within the section, m2.</summary>
    double AreaM2(double depthM);

    /// <summary>Width of the water surface at a depth, m.</summary>
    double TopWidthM(double depthM);

    /// <summary>Wetted perimeter at a depth, m; the crown of a closed section counts only when it is full.</summary>
    double WettedPerimeterM(double depthM);

    /// <summary>Depth of the centroid of the flow area below the water surface, m.</summary>
    double CentroidDepthM(double depthM);
}

/// <summary>A circular barrel.</summary>
/// <param name="DiameterM">Inside diameter D, m.</param>
public sealed record CircleSection(double DiameterM) : ISection
{
    // Angle of largest conveyance: 3 t - 5 t cos t + 2 sin t = 0 (Chow 1959, sec. 6-4: y = 0.938 D).
    private const double PeakAngle = 5.2781073;

    /// <inheritdoc/>
    public double RiseM => DiameterM;

    /// <inheritdoc/>
    public double SpanM => DiameterM;

    /// <inheritdoc/>
    public double FullAreaM2 => Math.PI * DiameterM * DiameterM / 4;

    /// <inheritdoc/>
    public double FullPerimeterM => Math.PI * DiameterM;

    /// <inheritdoc/>
    public double PeakConveyanceDepthM => DiameterM * (1 - Math.Cos(PeakAngle / 2)) / 2;

    /// <inheritdoc/>
    public double AreaM2(double depthM)
    {
        var t = Angle(depthM);
        return DiameterM * DiameterM / 8 * (t - Math.Sin(t));
    }

    /// <inheritdoc/>
    public double TopWidthM(double depthM)
    {
        var y = Math.Clamp(depthM, 0, DiameterM);
        return 2 * Math.Sqrt(y * (DiameterM - y));
    }

    /// <inheritdoc/>
    public double WettedPerimeterM(double depthM) => DiameterM * Angle(depthM) / 2;

    /// <inheritdoc/>
    public double CentroidDepthM(double depthM)
    {
        var half = Angle(depthM) / 2;
        if (half == 0) return 0;
        var sin = Math.Sin(half);
        var moment = DiameterM * DiameterM * DiameterM / 24 * ((3 * sin) - (sin * sin * sin) - (3 * half * Math.Cos(half)));
        return moment / AreaM2(depthM);
    }

    private double Angle(double depthM) => 2 * Math.Acos(Math.Clamp(1 - (2 * depthM / DiameterM), -1, 1));
}

/// <summary>A rectangular barrel without haunches.</summary>
/// <param name="WidthM">Span B, m.</param>
/// <param name="HeightM">Rise D, m.</param>
public sealed record BoxSection(double WidthM, double HeightM) : ISection
{
    /// <inheritdoc/>
    public double RiseM => HeightM;

    /// <inheritdoc/>
    public double SpanM => WidthM;

    /// <inheritdoc/>
    public double FullAreaM2 => WidthM * HeightM;

    /// <inheritdoc/>
    public double FullPerimeterM => 2 * (WidthM + HeightM);

    /// <inheritdoc/>
    public double PeakConveyanceDepthM => HeightM;

    /// <inheritdoc/>
    public double AreaM2(double depthM) => WidthM * Math.Clamp(depthM, 0, HeightM);

    /// <inheritdoc/>
    public double TopWidthM(double depthM) => WidthM;

    /// <inheritdoc/>
    public double WettedPerimeterM(double depthM) => WidthM + (2 * Math.Clamp(depthM, 0, HeightM));

    /// <inheritdoc/>
    public double CentroidDepthM(double depthM) => Math.Clamp(depthM, 0, HeightM) / 2;
}

/// <summary>An open channel with a flat bottom and even sides; a rectangle with side slope 0, a triangle with bottom width 0.</summary>
/// <param name="BottomWidthM">Bottom width b, m.</param>
/// <param name="SideSlope">Side slope z, horizontal per one vertical.</param>
public sealed record TrapezoidSection(double BottomWidthM, double SideSlope) : ISection
{
    /// <inheritdoc/>
    public double RiseM => double.PositiveInfinity;

    /// <inheritdoc/>
    public double SpanM => double.PositiveInfinity;

    /// <inheritdoc/>
    public double FullAreaM2 => double.PositiveInfinity;

    /// <inheritdoc/>
    public double FullPerimeterM => double.PositiveInfinity;

    /// <inheritdoc/>
    public double PeakConveyanceDepthM => double.PositiveInfinity;

    /// <inheritdoc/>
    public double AreaM2(double depthM) => (BottomWidthM + (SideSlope * depthM)) * depthM;

    /// <inheritdoc/>
    public double TopWidthM(double depthM) => BottomWidthM + (2 * SideSlope * depthM);

    /// <inheritdoc/>
    public double WettedPerimeterM(double depthM) => BottomWidthM + (2 * depthM * Math.Sqrt(1 + (SideSlope * SideSlope)));

    /// <inheritdoc/>
    public double CentroidDepthM(double depthM) =>
        depthM <= 0 ? 0 : depthM * ((3 * BottomWidthM) + (2 * SideSlope * depthM)) / (6 * (BottomWidthM + (SideSlope * depthM)));
}
