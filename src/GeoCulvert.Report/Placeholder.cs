namespace GeoCulvert.Report;
