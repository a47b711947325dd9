Console.WriteLine("0 hold, 0 do not");
return 1;
