Console.Error.WriteLine("interfacefe");
return 1;
