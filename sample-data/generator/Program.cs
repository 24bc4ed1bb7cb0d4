using GeoCulvert.SampleData;

if (args.Length != 1)
{
    Console.Error.WriteLine("Usage: GeoCulvert.SampleTerrain FOLDER   writes the maps of the sample valley; make.sh calls it and packs them.");
    return 2;
}

var valley = WexmarrowVale.Make();
Directory.CreateDirectory(args[0]);
ValleyMaps.Write(valley, args[0]);
foreach (var road in valley.Roads.Where(r => r.Streams.Count > 0))
{
    var steepest = Enumerable.Range(10, road.StationM.Length - 10)
        .Max(k => Math.Abs((road.LevelM[k] - road.LevelM[k - 10]) / (road.StationM[k] - road.StationM[k - 10])));
    Console.WriteLine($"{road.Plan.Name}: {road.StationM[^1]:f0} m, steepest grade {100 * steepest:f1} %");
    foreach (var s in road.Streams)
        Console.WriteLine($"  station {s.StationM,6:f0} m  area {s.AreaM2 / 1e4,7:f1} ha  fill {s.RoadM - s.BedM,4:f1} m  {(valley.Opened.Contains(s) ? "opened" : "bank in the terrain")}");
}

return 0;
