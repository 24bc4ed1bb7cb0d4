Console.Error.WriteLine("geoculvert");
return 1;
