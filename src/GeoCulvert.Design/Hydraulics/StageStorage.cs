namespace GeoCulvert.Design.Hydraulics;

/// <summary>One level of a pool.</summary>
/// <param name="LevelM">Water level, m.</param>
/// <param name="AreaM2">Area of the surface, m2.</param>
/// <param name="VolumeM3">Volume below it, m3.</param>
public sealed record StoragePoint(double LevelM, double AreaM2, double VolumeM3);

/// <summary>Volume of a pool against its level: straight between the points, none below the first, not known above the last.</summary>
public sealed class StageStorage
{
    /// <summary>Makes a table.</summary>
    /// <param name="points">Two or more, by rising level; the first without volume.</param>
    /// <exception cref="ArgumentException">Levels do not rise, or areas or volumes fall.</exception>
    public StageStorage(IReadOnlyList<StoragePoint> points)
    {
        ArgumentNullException.ThrowIfNull(points);
        if (points.Count < 2) throw new ArgumentException("two points or more", nameof(points));
        if (points[0].VolumeM3 != 0) throw new ArgumentException("the first point holds no water", nameof(points));
        for (var k = 1; k < points.Count; k++)
            if (!(points[k].LevelM > points[k - 1].LevelM) || !(points[k].VolumeM3 >= points[k - 1].VolumeM3) || !(points[k].AreaM2 >= points[k - 1].AreaM2))
                throw new ArgumentException($"point {k} does not follow point {k - 1}", nameof(points));
        Points = points;
    }

    /// <summary>The points.</summary>
    public IReadOnlyList<StoragePoint> Points { get; }

    /// <summary>Level of the bed, m.</summary>
    public double BedM => Points[0].LevelM;

    /// <summary>Highest level of the table, m.</summary>
    public double HighestM => Points[^1].LevelM;

    /// <summary>Volume at a level, m3.</summary>
    /// <exception cref="ArgumentOutOfRangeException">Above the table.</exception>
    public double VolumeM3(double levelM)
    {
        if (!(levelM <= HighestM)) throw new ArgumentOutOfRangeException(nameof(levelM), levelM, $"above {HighestM}");
        if (levelM <= BedM) return 0;
        int low = 0, high = Points.Count - 1;
        while (high - low > 1)
        {
            var mid = (low + high) / 2;
            if (Points[mid].LevelM <= levelM) low = mid;
            else high = mid;
        }

        var (a, b) = (Points[low], Points[high]);
        return a.VolumeM3 + ((levelM - a.LevelM) / (b.LevelM - a.LevelM) * (b.VolumeM3 - a.VolumeM3));
    }
}
