namespace GeoCulvert.Design.Crossings;

/// <summary>Low points of a road profile: water on the road and in its ditches comes together there.</summary>
public static class RoadLowPoints
{
    /// <summary>Rise on both sides from which a low point counts, m. Default 0.3 (own rule): above the noise of a terrain model and the camber.</summary>
    public const double SmallestRiseM = 0.3;

    /// <summary>
    /// Stations of the low points of a profile, by station: lower than any point between them and a rise of <paramref name="riseM"/> on both sides. A level bottom
    /// gives its middle. The ends of the profile are none.
    /// </summary>
    /// <param name="profile">Stations and levels by rising station.</param>
    /// <param name="riseM">Rise on both sides, m, positive.</param>
    public static IReadOnlyList<double> Of(IReadOnlyList<ProfilePoint> profile, double riseM = SmallestRiseM)
    {
        ArgumentNullException.ThrowIfNull(profile);
        if (!(riseM > 0)) throw new ArgumentOutOfRangeException(nameof(riseM), riseM, "The rise must be positive.");
        var found = new List<double>();
        if (profile.Count == 0) return found;

        // One walk: a low point is settled when the profile has come down by the rise before it and climbs by the rise after it.
        int first = 0, last = 0;
        var highest = profile[0].ElevationM;
        var cameDown = false;
        for (var i = 1; i < profile.Count; i++)
        {
            var z = profile[i].ElevationM;
            if (z < profile[first].ElevationM) (first, last) = (i, i);
            else if (z == profile[first].ElevationM && i == last + 1) last = i;
            if (!cameDown)
            {
                if (z > highest) { highest = z; (first, last) = (i, i); }
                else if (highest - profile[first].ElevationM >= riseM) cameDown = true;
            }

            if (!cameDown || z - profile[first].ElevationM < riseM) continue;
            found.Add((profile[first].StationM + profile[last].StationM) / 2);
            (cameDown, highest, first, last) = (false, z, i, i);
        }

        return found;
    }
}
