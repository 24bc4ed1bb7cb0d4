Console.Error.WriteLine("geoculvert");
if (args is ["schema"]) Console.Out.Write(GeoCulvert.Cli.Project.ProjectSchema.Write());
return 1;
