using GeoCulvert.Design.Basis;
using NetTopologySuite.Geometries;

namespace GeoCulvert.Design.Study;

/// <summary>What kind of geometry the rows of a layer carry.</summary>
public enum LayerGeometry
{
    /// <summary>A plain table.</summary>
    None,

    /// <summary>Points.</summary>
    Point,

    /// <summary>Lines.</summary>
    Line,

    /// <summary>Polygons or multi-polygons.</summary>
    Polygon,
}

/// <summary>Type of the values in a field.</summary>
public enum FieldType
{
    /// <summary><see cref="string"/>.</summary>
    Text,

    /// <summary><see cref="long"/>.</summary>
    Integer,

    /// <summary><see cref="double"/>.</summary>
    Real,

    /// <summary><see cref="bool"/>.</summary>
    Boolean,
}

/// <summary>A field of a result layer, named with its unit suffix in the chosen system.</summary>
/// <param name="Name">snake_case name with unit suffix, as written to files.</param>
/// <param name="Type">Type of the values.</param>
/// <param name="Title">Short heading for people, without unit.</param>
/// <param name="Description">One sentence on what the value is.</param>
/// <param name="Unit">Unit symbol, "" when it has none.</param>
public sealed record ResultField(string Name, FieldType Type, string Title, string Description, string Unit);

/// <summary>A row: geometry (null in plain tables) and one value per field (null, string, long, double or bool).</summary>
public sealed record ResultRow(Geometry? Geometry, IReadOnlyList<object?> Values);

/// <summary>One layer or table of the results, already in the output system of units; writers need nothing else.</summary>
/// <param name="Name">Layer name, as in <c>results.gpkg</c>.</param>
/// <param name="Title">Heading for people.</param>
/// <param name="Description">What a row is.</param>
/// <param name="Geometry">Kind of geometry.</param>
/// <param name="Fields">Fields in order.</param>
/// <param name="Rows">Rows in order.</param>
public sealed record ResultLayer(
    string Name,
    string Title,
    string Description,
    LayerGeometry Geometry,
    IReadOnlyList<ResultField> Fields,
    IReadOnlyList<ResultRow> Rows);

/// <summary>A column of a layer that is being defined: what it is called, what it measures and how a row gets its value in SI.</summary>
/// <typeparam name="T">Type of the object a row is made from.</typeparam>
/// <param name="Name">snake_case name without unit suffix.</param>
/// <param name="Kind">What it measures.</param>
/// <param name="Type">Type of the values.</param>
/// <param name="Title">Short heading.</param>
/// <param name="Description">One sentence.</param>
/// <param name="Value">The value of a row: null, string, long, bool, or a double in SI.</param>
public sealed record LayerColumn<T>(
    string Name, QuantityKind Kind, FieldType Type, string Title, string Description, Func<T, object?> Value)
{
    /// <summary>The field in a system of units.</summary>
    public ResultField Field(UnitSystem units) =>
        new(Name + DisplayUnits.FieldSuffix(Kind, units), Type, Title, Description, DisplayUnits.Symbol(Kind, units));

    /// <summary>The value of a row in a system of units; numbers that are not finite become null.</summary>
    public object? ValueIn(T row, UnitSystem units) => Value(row) switch
    {
        double d when !double.IsFinite(d) => null,
        double d => DisplayUnits.FromSi(d, Kind, units),
        int i => (long)i,
        var other => other,
    };
}

/// <summary>The definition of a layer, from which its rows, its documentation and its field descriptions all come.</summary>
/// <typeparam name="T">Type of the object a row is made from.</typeparam>
/// <param name="Name">Layer name.</param>
/// <param name="Title">Heading for people.</param>
/// <param name="Description">What a row is.</param>
/// <param name="Geometry">Kind of geometry.</param>
/// <param name="Shape">Geometry of a row, or null.</param>
/// <param name="Columns">Columns in order.</param>
public sealed record LayerDefinition<T>(
    string Name,
    string Title,
    string Description,
    LayerGeometry Geometry,
    Func<T, Geometry?> Shape,
    IReadOnlyList<LayerColumn<T>> Columns)
{
    /// <summary>Makes the layer from its objects.</summary>
    public ResultLayer Build(IEnumerable<T> items, UnitSystem units) => new(
        Name,
        Title,
        Description,
        Geometry,
        [.. Columns.Select(c => c.Field(units))],
        [.. items.Select(i => new ResultRow(Shape(i), [.. Columns.Select(c => c.ValueIn(i, units))]))]);
}
