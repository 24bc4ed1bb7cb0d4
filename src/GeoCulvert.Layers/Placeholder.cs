namespace GeoCulvert.Layers;
