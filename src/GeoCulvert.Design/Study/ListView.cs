using System.Collections;
using GeoCulvert.Design.Watersheds;

namespace GeoCulvert.Design.Study;

/// <summary>Stations of a flow path as another list sees them, made as they are asked for: thousands of nested crossings share their paths.</summary>
internal static class ListView
{
    /// <summary>Stations that have an elevation, turned into something else.</summary>
    public static IReadOnlyList<T> WithElevation<T>(IReadOnlyList<FlowPathStation> stations, Func<FlowPathStation, T> value) =>
        stations.Any(s => double.IsNaN(s.ElevationM)) ? [.. stations.Where(s => !double.IsNaN(s.ElevationM)).Select(value)] : new View<T>(stations, value);

    private sealed class View<T>(IReadOnlyList<FlowPathStation> stations, Func<FlowPathStation, T> value) : IReadOnlyList<T>
    {
        public int Count => stations.Count;

        public T this[int index] => value(stations[index]);

        public IEnumerator<T> GetEnumerator() => stations.Select(value).GetEnumerator();

        IEnumerator IEnumerable.GetEnumerator() => GetEnumerator();
    }
}
